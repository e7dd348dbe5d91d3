import { Histogram } from '@/components/figures/Histogram';
import { ShareBars } from '@/components/figures/ShareBars';
import { Button } from '@/components/ui/Button';
import { Sign } from '@/components/ui/Sign';
import type { ExampleShown, MisstepShare, StoredReport } from '@/lib/bank/sandbox-tasks';
import type { Problem } from '@/lib/templates/problem';
import { byCode, codeTitles, extentOf, percentOf } from './findings';

type Seeds = { onSeed: (seed: string) => void };

function Found({ problem, draws, onSeed }: { problem: Problem; draws: number } & Seeds) {
  const extent = extentOf(problem, draws);
  return (
    <li className="grid gap-1 text-15">
      <p>
        {problem.part && <b className="font-medium">Part {problem.part}: </b>}
        {problem.line && <b className="font-medium">Line {problem.line}: </b>}
        {problem.says}
      </p>
      {extent && (
        <p className="flex flex-wrap items-center gap-1 text-13 text-ink-soft">
          <span>{extent}; see</span>
          {problem.seeds.map((seed) => (
            <Button key={seed} size="dense" look="quiet" className="font-mono" onClick={() => onSeed(seed)}>{seed}</Button>
          ))}
        </p>
      )}
    </li>
  );
}

/** Problems under a heading for each code; a seed shows the draw in which it was met. */
export function ProblemGroups({ problems, draws, onSeed, excused }: { problems: readonly Problem[]; draws: number; excused?: boolean } & Seeds) {
  return (
    <ul className="grid gap-4">
      {byCode(problems).map(([code, group]) => (
        <li key={code} className="grid gap-2 border-b border-rule pb-3">
          <div className="flex flex-wrap items-baseline justify-between gap-x-3">
            <Sign shape={excused ? 'check-ruled' : 'sq-bang'} tone={excused ? 'none' : 'wait'}>{codeTitles[code]}</Sign>
            <code className="font-mono text-13 text-ink-soft">{code}</code>
          </div>
          <ul className="grid gap-2">{group.map((problem, place) => <Found key={place} problem={problem} draws={draws} onSeed={onSeed} />)}</ul>
        </li>
      ))}
    </ul>
  );
}

const limit = 0.01;

function Missteps({ missteps }: { missteps: readonly MisstepShare[] }) {
  const shares = missteps.map(({ part, says, share, separatedBy }) => ({
    label: `${part}: ${says}${separatedBy ? ` (part ${separatedBy} marks that step)` : ''}`, share, says: percentOf(share), low: share > limit && separatedBy === undefined,
  }));
  return <ShareBars label="Share of the draws in which the tolerance accepts a misstep" shares={shares} lowSays="over the limit" />;
}

function Examples({ examples }: { examples: readonly ExampleShown[] }) {
  return (
    <ul className="grid gap-2">
      {examples.map(({ source, obtained, figures, reproduced }, place) => (
        <li key={place} className="grid gap-1 text-15">
          <Sign shape={reproduced ? 'check' : 'cross'} tone={reproduced ? 'ok' : 'stop'}>{figures} {reproduced ? 'reproduced' : 'not reproduced'}</Sign>
          <span className="text-13 text-ink-soft">{source}{obtained === 'memory' && ' (from memory)'}</span>
        </li>
      ))}
    </ul>
  );
}

function Section({ title, children }: { title: string; children: React.ReactNode }) {
  return (
    <section className="section--cap grid gap-3">
      <h3 className="text-16">{title}</h3>
      {children}
    </section>
  );
}

/** All that a check found over its draws. */
export function Findings({ report, onSeed }: { report: StoredReport } & Seeds) {
  const { problems, excused, draws, bins, units, missteps, examples, redraws, distinct } = report;
  const figures = Object.entries(bins).filter(([, bars]) => bars.length > 0);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-6">
      {problems.length > 0 && <ProblemGroups problems={problems} draws={draws} onSeed={onSeed} />}
      {excused.length > 0 && <Section title="Answered by a reason in the text"><ProblemGroups problems={excused} draws={draws} onSeed={onSeed} excused /></Section>}
      <p className="text-15 text-ink-soft">
        {distinct.toLocaleString('en')} different sets of keys in {draws.toLocaleString('en')} draws; {redraws.mean} redraws a draw, at most {redraws.max}.
      </p>
      {figures.map(([part, bars]) => <Histogram key={part} title={`Key of part ${part}`} unit={units[part] ?? ''} counted="Draws" bins={bars} />)}
      {missteps.length > 0 && (
        <Section title="Missteps the tolerance accepts">
          <Missteps missteps={missteps} />
          <p className="help">More than 1 % of the draws stops the review, unless an earlier part marks that step by itself.</p>
        </Section>
      )}
      {examples.length > 0 && <Section title="Published figures"><Examples examples={examples} /></Section>}
    </div>
  );
}
