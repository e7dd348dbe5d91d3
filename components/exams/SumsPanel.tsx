import { Notice } from '@/components/ui/Notice';
import { RatingPlate } from '@/components/ui/RatingPlate';
import type { ExamProblem, ExamSums } from '@/lib/exams/sums';

type Props = { sums: ExamSums; minutes: number; sections: readonly string[]; problems: readonly ExamProblem[] };

/** What the exam adds up to beside the time allowed, and what wants a look. */
export function SumsPanel({ sums, minutes, sections, problems }: Props) {
  const cells = [
    { label: 'Questions', value: String(sums.questions) },
    { label: 'Marks', value: String(sums.marks) },
    { label: 'Expected', value: String(sums.minutes), unit: 'min' },
    { label: 'Allowed', value: minutes > 0 ? String(minutes) : '–', unit: 'min' },
  ];
  const stops = problems.filter((problem) => problem.stops);
  const looks = problems.filter((problem) => !problem.stops);
  return (
    <section aria-label="Sums">
      <RatingPlate label="What the exam adds up to" cells={cells} columns={2} dense />
      <table className="ledger mt-4" role="table" aria-label="Marks and minutes by section">
        <thead role="rowgroup">
          <tr role="row"><th scope="col" role="columnheader">Section</th><th scope="col" role="columnheader" className="n">Marks</th><th scope="col" role="columnheader" className="n">Min</th></tr>
        </thead>
        <tbody role="rowgroup">
          {sums.sections.map((sum, index) => (
            <tr role="row" key={index}>
              <th scope="row" role="rowheader">{sections[index] || `Section ${index + 1}`}</th>
              <td role="cell" className="n" data-head="Marks">{sum.marks}</td>
              <td role="cell" className="n" data-head="Min">{sum.minutes}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="mt-4 grid gap-3" role="status">
        {stops.length > 0 && <Problems kind="stop" title="Before a review:" problems={stops} />}
        {looks.length > 0 && <Problems kind="wait" title="Have a look:" problems={looks} />}
        {problems.length === 0 && <Notice kind="ok">Nothing stands in the way of a review.</Notice>}
      </div>
    </section>
  );
}

function Problems({ kind, title, problems }: { kind: 'stop' | 'wait'; title: string; problems: readonly ExamProblem[] }) {
  return (
    <Notice kind={kind} title={title}>
      <ul>{problems.map((problem) => <li key={problem.says}>{problem.says}</li>)}</ul>
    </Notice>
  );
}
