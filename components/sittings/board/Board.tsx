'use client';

import { useMemo, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { timeIn } from '@/components/ui/clock-text';
import { Notice } from '@/components/ui/Notice';
import type { Result } from '@/lib/result';
import type { BoardAction } from '@/lib/sittings/board-actions';
import type { BoardSnapshot } from '@/lib/sittings/board-model';
import { ActionDialog, type Asking } from './ActionDialog';
import { BoardHead } from './BoardHead';
import { CandidatePanel } from './CandidatePanel';
import { inRoomOrder } from './look';
import { SeatLedger } from './SeatLedger';
import { SeatPlan } from './SeatPlan';
import { useBoard } from './use-board';

/** The proctor's board: counts first, the room's seats or the same as rows, one candidate at the side. */
export function Board({ first, act }: { first: BoardSnapshot; act: (action: BoardAction) => Promise<Result<null>> }) {
  const { board, now, live } = useBoard(first);
  const [asking, setAsking] = useState<Asking | null>(null);
  const [selected, setSelected] = useState<string | null>(null);
  const [view, setView] = useState<'plan' | 'rows'>('plan');
  const [trouble, setTrouble] = useState<string | null>(null);
  const { zoneOffset } = board.sitting;
  const time = useMemo(() => (at: number) => timeIn(at, zoneOffset), [zoneOffset]);
  const run = (action: BoardAction) => {
    setTrouble(null);
    void act(action).then((result) => (result.ok ? undefined : setTrouble(result.says)));
  };
  const seats = inRoomOrder(board.seats);
  const chosen = seats.find((seat) => seat.candidateId === selected);
  const waiting = seats.filter((seat) => seat.state === 'expected');
  const inRoom = ['check-in', 'running', 'paused'].includes(board.sitting.state);
  const Seats = view === 'plan' ? SeatPlan : SeatLedger;
  return (
    <div className="board-page">
      <BoardHead board={board} now={now} live={live} time={time} ask={setAsking} run={run} />
      {trouble && <Notice kind="stop" live>{trouble}</Notice>}
      <div className="board-tools">
        <div className="btn-row" role="group" aria-label="View">
          <Button aria-pressed={view === 'plan'} className={view === 'plan' ? 'is-on' : ''} onClick={() => setView('plan')}>Seats</Button>
          <Button aria-pressed={view === 'rows'} className={view === 'rows' ? 'is-on' : ''} onClick={() => setView('rows')}>Rows</Button>
        </div>
        {board.mayRun && inRoom && waiting.length > 1 && (
          <Button onClick={() => setAsking(admitAll(waiting.map((seat) => seat.candidateId)))}>Admit all {waiting.length} expected</Button>
        )}
      </div>
      <div className={`board${chosen ? ' board--with-side' : ''}`}>
        <Seats seats={seats} board={board} now={now} time={time} selected={selected} onSelect={(id) => setSelected(id === selected ? null : id)} />
        {chosen && <CandidatePanel board={board} seat={chosen} now={now} time={time} ask={setAsking} run={run} />}
      </div>
      {asking && <ActionDialog key={asking.title} asking={asking} act={act} onClose={() => setAsking(null)} />}
    </div>
  );
}

const admitAll = (candidates: string[]): Asking => ({
  title: `Admit all ${candidates.length} expected candidates?`,
  says: 'Only when you have seen each of them and their identification.',
  verb: 'Admit all',
  action: () => ({ do: 'admit', candidates }),
});
