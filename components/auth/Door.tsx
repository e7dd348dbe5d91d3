import type { ReactNode } from 'react';
import { Brand } from '@/components/shell/Mark';
import { type PlateCell, RatingPlate } from '@/components/ui/RatingPlate';

type Props = { school: string; facts: readonly PlateCell[]; links?: ReactNode; children: ReactNode };

/** The two halves of the way in: the school at the left, what is to be done at the right. */
export function Door({ school, facts, links, children }: Props) {
  return (
    <div className="grid min-h-screen grid-rows-[auto_1fr] lg:grid-cols-[1fr_minmax(0,624px)] lg:grid-rows-1">
      <section aria-label="The school" className="flex flex-col gap-8 px-4 py-6 sm:px-6 lg:px-16 lg:py-10 xl:pl-24">
        <Brand />
        <div className="my-auto w-full max-w-[592px]">
          <h1 className="text-28 sm:text-36">{school}</h1>
          <p className="mt-2 mb-6 max-w-[52ch] text-18 text-ink-soft lg:mb-10">Practice, exams and results of the electrical trades. Every candidate works with values of their own.</p>
          <RatingPlate label="The school" kind="record" columns={2} cells={facts} />
        </div>
        {links && <nav aria-label="Other ways" className="flex flex-wrap gap-x-6 gap-y-2 text-15">{links}</nav>}
      </section>
      <main id="main" tabIndex={-1} className="grid place-items-center border-t border-rule bg-sheet px-4 py-10 sm:px-10 lg:border-t-0 lg:border-l">
        <div className="w-full max-w-[384px]">{children}</div>
      </main>
    </div>
  );
}
