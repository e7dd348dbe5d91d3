import Link from 'next/link';

export type ClassLine = { id: string; name: string; term: string; part: 'enrolled' | 'teaches'; since: string | null; until: string | null };

/** The classes that somebody is or was in, the newest term first. `date` prints a day. */
export function PersonClasses({ classes, date }: { classes: readonly ClassLine[]; date: (day: string) => string }) {
  if (classes.length === 0) return <p className="text-15 text-ink-soft">In no class. People are enrolled on the page of the class.</p>;
  return (
    <ul>
      {classes.map((one) => (
        <li key={`${one.id} ${one.part}`} className="flex flex-wrap justify-between gap-x-4 border-b border-rule py-2 text-15">
          <span>
            <Link href={`/people/classes/${one.id}`}>{one.name}</Link>, {one.term}
          </span>
          <span className="text-ink-soft">
            {one.part === 'teaches' ? 'teaches it' : `enrolled${one.since ? ` from ${date(one.since)}` : ''}${one.until ? ` until ${date(one.until)}` : ''}`}
          </span>
        </li>
      ))}
    </ul>
  );
}
