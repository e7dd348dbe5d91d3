'use client';

import { useState } from 'react';
import { QuestionSheet } from '@/components/candidates/QuestionSheet';
import { Button } from '@/components/ui/Button';
import { Figures } from '@/components/ui/Figures';
import { MathText } from '@/components/ui/MathText';
import { Notice } from '@/components/ui/Notice';
import { Sign } from '@/components/ui/Sign';
import type { DrawShown, PartShown, Preview } from '@/lib/bank/sandbox-tasks';
import { notationOf } from '@/lib/numeric/notation';

function SeedBar({ seed, onSeed }: { seed: string; onSeed: (seed: string) => void }) {
  const [typed, setTyped] = useState(seed);
  const [shown, setShown] = useState(seed);
  if (shown !== seed) {
    setShown(seed);
    setTyped(seed);
  }
  const next = () => {
    const [, stem = 'check-', number = '0'] = /^(.*?)(\d+)$/.exec(seed) ?? [null, `${seed}-`, '0'];
    onSeed(`${stem}${Number(number) + 1}`);
  };
  return (
    <form
      className="flex flex-wrap items-center gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        if (typed.trim() !== '') onSeed(typed.trim());
      }}
    >
      <input className="input input--sm w-36 font-mono" aria-label="Seed of the draw" value={typed} maxLength={80} onChange={(event) => setTyped(event.target.value)} />
      <Button type="submit" size="dense">Show this draw</Button>
      <Button size="dense" onClick={next}>Another draw</Button>
    </form>
  );
}

function Keys({ parts }: { parts: readonly PartShown[] }) {
  return (
    <table className="ledger" aria-label="Keys of this draw">
      <thead>
        <tr>
          <th scope="col">Part</th>
          <th scope="col" className="n dbl">Key</th>
          <th scope="col" className="n">Accepts</th>
          <th scope="col" className="n">Marks</th>
        </tr>
      </thead>
      <tbody>
        {parts.map((part) => (
          <tr key={part.part}>
            <th scope="row">{part.part}</th>
            <td className="n dbl" data-head="Key"><Figures text={part.key} /></td>
            <td className="n" data-head="Accepts">{part.accepts || '–'}</td>
            <td className="n" data-head="Marks">{part.marks}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

const earnsInWords = (earns: number): string => (earns === 0 ? 'earns nothing' : `earns ${earns} ${earns === 1 ? 'mark' : 'marks'}`);

function Wrong({ part }: { part: PartShown }) {
  const right = part.options.find((option) => option.right);
  return (
    <>
      {right && <li className="border-b border-rule py-2 text-15"><Sign shape="check" tone="ok" small>Part {part.part}: option {right.option} is right</Sign></li>}
      {part.options.filter((option) => !option.right && option.says).map((option) => (
        <li key={option.option} className="border-b border-rule py-2 text-15">Part {part.part}, option {option.option}: {option.says}</li>
      ))}
      {part.missteps.map((misstep, place) => (
        <li key={place} className="flex flex-wrap justify-between gap-x-4 border-b border-rule py-2 text-15">
          <span>Part {part.part}: {misstep.says}</span>
          <span className="text-ink-soft">
            <span className="font-mono text-ink"><Figures text={misstep.value} /></span> · {earnsInWords(misstep.earns)}
            {misstep.separatedBy && `, marked by part ${misstep.separatedBy}`}
          </span>
        </li>
      ))}
    </>
  );
}

// The pane is narrower than the sheet that its viewport would have: the answer stands beneath its question here too.
const narrow = '[&_.part]:grid-cols-[2rem_minmax(0,1fr)] [&_.part>:nth-child(3)]:col-start-2 [&_.part>:nth-child(3)]:mt-3';

function Drawn({ draw, locale }: { draw: DrawShown; locale: string }) {
  const looking = { answerOf: () => '', stateOf: () => 'blank' as const };
  const wrong = draw.parts.some((part) => part.missteps.length > 0 || part.options.length > 0);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-6">
      <section aria-label="The question as a candidate sees it" className={narrow}>
        <QuestionSheet question={draw.question} place={{ number: 1, of: 1 }} notation={notationOf(locale)} answering={looking} />
      </section>
      <section className="section--cap" aria-labelledby="keys-title">
        <h2 id="keys-title">Key in these numbers</h2>
        <Keys parts={draw.parts} />
      </section>
      {wrong && (
        <section className="section--cap" aria-labelledby="wrong-title">
          <h2 id="wrong-title">Missteps in these numbers</h2>
          <ul>{draw.parts.map((part) => <Wrong key={part.part} part={part} />)}</ul>
        </section>
      )}
      <section className="section--cap" aria-labelledby="solution-title">
        <h2 id="solution-title">Solution in these numbers</h2>
        <div className="overflow-x-auto pt-3 [&_.katex-display]:overflow-visible" tabIndex={0} role="group" aria-labelledby="solution-title"><MathText html={draw.solutionHtml} /></div>
      </section>
    </div>
  );
}

export type Look = { preview: Preview | undefined; error: string; drawing: boolean };

/** One draw of the text as it stands in the editor: the question as a candidate sees it, and beneath it what a candidate never gets. */
export function DrawPane({ look, seed, onSeed, locale }: { look: Look; seed: string; onSeed: (seed: string) => void; locale: string }) {
  const { preview, error, drawing } = look;
  const old = preview?.draw && preview.draw.seed !== seed;
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <div className="flex flex-wrap items-center justify-between gap-3">
        <SeedBar seed={seed} onSeed={onSeed} />
        <span className="text-13 text-ink-soft" role="status">
          {drawing ? 'Drawing…' : preview?.draw ? `${preview.draw.redraws} ${preview.draw.redraws === 1 ? 'redraw' : 'redraws'}` : ''}
        </span>
      </div>
      {error && <Notice kind="stop" live>{error}</Notice>}
      {preview?.refused && <Notice kind="wait" title="No draw.">{preview.refused}</Notice>}
      {preview && preview.problems.length > 0 && (
        <Notice kind="wait" title="The text does not read yet.">
          {preview.problems.length === 1 ? 'One problem stands' : `${preview.problems.length} problems stand`} beneath the text. A draw appears once it reads.
        </Notice>
      )}
      {preview?.draw && <div aria-busy={drawing || undefined} className={old ? 'opacity-60' : undefined}><Drawn draw={preview.draw} locale={locale} /></div>}
    </div>
  );
}
