import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import { LinkButton } from '@/components/ui/LinkButton';
import { StateMark } from '@/components/ui/StateMark';
import type { PaperState } from '@/lib/planning/model';
import type { SittingState } from '@/lib/sittings/model';

export type SittingLine = {
  id: string;
  title: string;
  className: string;
  room: string;
  state: SittingState;
  startsAt: Date;
  candidates: number;
  papers: PaperState;
  papersDrawn: number;
  proctors: string;
  mine: boolean;
};

const columns: LedgerColumn[] = [
  { key: 'title', title: 'Sitting' },
  { key: 'class', title: 'Class', choose: true },
  { key: 'room', title: 'Room' },
  { key: 'proctors', title: 'Proctors' },
  { key: 'candidates', title: 'Candidates', figures: 0, rule: true },
  { key: 'starts', title: 'Starts', figures: true },
  { key: 'state', title: 'State', rule: true, choose: true },
  { key: 'papers', title: 'Papers' },
  { key: 'board', title: 'Board' },
];
const inRoom: readonly SittingState[] = ['planned', 'check-in', 'running', 'paused'];

function papersCell(sitting: SittingLine) {
  if (sitting.papers === 'drawn') return { value: 'drawn', show: <StateMark thing="papers" state="drawn" /> };
  const said = sitting.papers === 'drawing' ? `${sitting.papersDrawn} of ${sitting.candidates}` : undefined;
  return { value: said ?? sitting.papers, show: <StateMark thing="papers" state={sitting.papers}>{said}</StateMark> };
}

const lineOf = (sitting: SittingLine, moment: (time: Date) => string): LedgerRow => ({
  id: sitting.id,
  href: `/sittings/${sitting.id}`,
  gone: sitting.state === 'cancelled',
  cells: {
    title: sitting.title,
    class: sitting.className,
    room: sitting.room,
    proctors: sitting.proctors || { value: 'none', show: <span className="text-ink-soft">none</span> },
    candidates: sitting.candidates,
    starts: { value: sitting.startsAt.toISOString(), show: <span className="whitespace-nowrap">{moment(sitting.startsAt)}</span> },
    state: { value: sitting.state, show: <StateMark thing="sitting" state={sitting.state} /> },
    papers: papersCell(sitting),
    board: sitting.mine && inRoom.includes(sitting.state) ? { value: 'open', show: <LinkButton size="dense" href={`/sittings/${sitting.id}/board`}>Open the board</LinkButton> } : '',
  },
});

/** Sittings that the reader may see. `moment` prints a time; `mayPlan` whether the reader can plan one. */
export function SittingLedger({ sittings, moment, mayPlan }: { sittings: readonly SittingLine[]; moment: (time: Date) => string; mayPlan: boolean }) {
  const empty = mayPlan ? (
    <EmptyState title="No sitting yet" says="Schedule an approved form for a class that you teach.">
      <LinkButton href="/sittings/new" look="main">Schedule a sitting</LinkButton>
    </EmptyState>
  ) : (
    <EmptyState title="No sitting yet" says="A sitting stands here once an instructor has assigned you to it." />
  );
  const shown = sittings.some((sitting) => sitting.mine) ? columns : columns.filter((column) => column.key !== 'board');
  const options = { noun: { one: 'sitting', many: 'sittings' }, find: 'Find a title, class, room or proctor', file: 'sittings', sort: { key: 'starts', descending: true } };
  return <Ledger label="Sittings" columns={shown} rows={sittings.map((sitting) => lineOf(sitting, moment))} empty={empty} options={options} />;
}
