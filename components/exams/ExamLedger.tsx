import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import { StateMark } from '@/components/ui/StateMark';
import type { ExamState } from '@/lib/exams/model';

export type ExamLine = {
  id: string;
  title: string;
  state: ExamState;
  questions: number;
  marks: number;
  /** Time allowed and expected working time [min]. */
  minutes: number;
  expected: number;
  forms: number;
  sittings: number;
  owner: string;
  changedAt: Date;
};

const columns: LedgerColumn[] = [
  { key: 'title', title: 'Exam' },
  { key: 'owner', title: 'Begun by' },
  { key: 'questions', title: 'Questions', figures: 0, rule: true },
  { key: 'marks', title: 'Marks', figures: true },
  { key: 'expected', title: 'Min expected', figures: true },
  { key: 'minutes', title: 'Min allowed', figures: 0 },
  { key: 'forms', title: 'Forms', figures: 0 },
  { key: 'sittings', title: 'Sittings', figures: 0 },
  { key: 'state', title: 'State', rule: true, choose: true },
  { key: 'changed', title: 'Changed', figures: true },
];

const lineOf = (exam: ExamLine, moment: (time: Date) => string): LedgerRow => ({
  id: exam.id,
  href: `/exams/${exam.id}`,
  gone: exam.state === 'retired',
  cells: {
    title: exam.title,
    owner: exam.owner,
    questions: exam.questions,
    marks: exam.marks,
    expected: Math.round(exam.expected),
    minutes: exam.minutes === 0 ? { value: null, show: '–' } : exam.minutes,
    forms: exam.forms,
    sittings: exam.sittings,
    state: { value: exam.state, show: <StateMark thing="exam" state={exam.state} /> },
    changed: { value: exam.changedAt.toISOString(), show: <span className="whitespace-nowrap text-13 text-ink-soft">{moment(exam.changedAt)}</span> },
  },
});

/** Every exam with its sums and state. `moment` prints a time. */
export function ExamLedger({ exams, moment }: { exams: readonly ExamLine[]; moment: (time: Date) => string }) {
  const empty = <EmptyState title="No exam yet" says="Give the first one a title above; then choose its questions from the bank." />;
  const options = { noun: { one: 'exam', many: 'exams' }, find: 'Find a title or a person', file: 'exams', sort: { key: 'changed', descending: true } };
  return <Ledger label="Exams" columns={columns} rows={exams.map((exam) => lineOf(exam, moment))} empty={empty} options={options} />;
}
