import { Sign } from '@/components/ui/Sign';
import type { Breakdown as Shares, RuleApplied, Share } from '@/lib/results/model';

type Printing = { marks: (value: number) => string; of: (value: number) => string };

function Line({ name, share, print, inner }: { name: string; share: Share; print: Printing; inner?: boolean }) {
  return (
    <tr>
      <th scope="row" className={inner ? 'text-ink-soft' : undefined}><span className={inner ? 'pl-4 font-normal' : 'font-semibold'}>{name}</span></th>
      <td className="n dbl" data-head="Marks">{print.marks(share.awarded)}</td>
      <td className="n" data-head="Of">{print.of(share.of)}</td>
      <td className="n" data-head="Percent">{print.marks(share.percent)}</td>
    </tr>
  );
}

/** Marks by section and, inside each, by area. */
export function Breakdown({ breakdown, total, print }: { breakdown: Shares; total: Share; print: Printing }) {
  return (
    <table className="ledger" aria-label="Marks by section and area">
      <thead><tr><th scope="col">Section and area</th><th scope="col" className="n dbl">Marks</th><th scope="col" className="n">Of</th><th scope="col" className="n">Percent</th></tr></thead>
      <tbody>
        {breakdown.sections.flatMap((section) => [
          <Line key={section.title} name={section.title} share={section} print={print} />,
          ...section.areas.map((area) => <Line key={`${section.title} ${area.area}`} name={area.title} share={area} print={print} inner />),
        ])}
      </tbody>
      <tfoot>
        <tr><th scope="row">Total</th><td className="n" data-head="Marks">{print.marks(total.awarded)}</td><td className="n" data-head="Of">{print.of(total.of)}</td><td className="n" data-head="Percent">{print.marks(total.percent)}</td></tr>
      </tfoot>
    </table>
  );
}

/** Each condition of the pass rule: wanted, had, met or not. */
export function RuleLines({ rule, print, sentence }: { rule: RuleApplied; print: Printing; sentence: string }) {
  return (
    <section className="section section--cap" aria-labelledby="rule-head">
      <h2 id="rule-head">How the outcome is decided</h2>
      <ul>
        {rule.rules.map((line) => (
          <li key={line.says} className="flex flex-wrap items-baseline justify-between gap-x-4 border-b border-rule py-2 text-15">
            <span>{line.says}: {print.of(line.wanted)} % or more</span>
            <span className="flex gap-4"><span className="num">{print.marks(line.had)} %</span>{line.met ? <Sign shape="check" tone="ok">met</Sign> : <Sign shape="cross" tone="stop">not met</Sign>}</span>
          </li>
        ))}
      </ul>
      <p className="mt-2 text-13 text-ink-soft">{sentence}</p>
    </section>
  );
}

