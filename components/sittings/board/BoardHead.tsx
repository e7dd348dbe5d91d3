'use client';

import Link from 'next/link';
import { Button } from '@/components/ui/Button';
import { clockText } from '@/components/ui/clock-text';
import { Notice } from '@/components/ui/Notice';
import { StateMark } from '@/components/ui/StateMark';
import { Tally, type TallyCount } from '@/components/ui/Tally';
import type { BoardAction } from '@/lib/sittings/board-actions';
import type { BoardSnapshot } from '@/lib/sittings/board-model';
import { candidateStates } from '@/lib/candidates/model';
import type { Asking } from './ActionDialog';
import { sittingAskings } from './askings';
import { leftAt, signalOf } from './look';

type HeadProps = { board: BoardSnapshot; now: number; live: boolean | null; time: (at: number) => string; ask: (asking: Asking) => void; run: (action: BoardAction) => void };

function dayInWords({ sitting }: BoardSnapshot): string {
  // Formatted as UTC, moved by the offset the server gave, and in one locale: server and browser then write the same.
  return new Intl.DateTimeFormat('en-GB', { timeZone: 'UTC', weekday: 'short', day: 'numeric', month: 'short' }).format(sitting.startsAt + sitting.zoneOffset * 60_000);
}

function whenInWords({ sitting }: BoardSnapshot, time: (at: number) => string): string {
  if (sitting.closedAt !== null) return `closed ${time(sitting.closedAt)}`;
  if (sitting.startedAt !== null) return `started ${time(sitting.startedAt)}, ${sitting.minutes} minutes`;
  return `starts ${time(sitting.startsAt)}, ${sitting.minutes} minutes`;
}

function Acts({ board, ask, run }: Pick<HeadProps, 'board' | 'ask' | 'run'>) {
  const { state } = board.sitting;
  const admitted = board.seats.some((seat) => seat.state === 'admitted');
  return (
    <div className="btn-row">
      {state === 'planned' && <Button size="touch" look="main" onClick={() => run({ do: 'open-check-in' })}>Open check-in</Button>}
      {state === 'check-in' && <Button size="touch" look="main" disabled={!admitted} onClick={() => ask(sittingAskings.start(board))}>Start</Button>}
      {state === 'running' && <Button size="touch" look="stop" onClick={() => ask(sittingAskings.pause(board))}>Pause all</Button>}
      {state === 'paused' && <Button size="touch" look="main" onClick={() => run({ do: 'resume' })}>Resume all</Button>}
      {state !== 'planned' && <Button size="touch" onClick={() => ask(sittingAskings.incident())}>Incident</Button>}
      {(state === 'running' || state === 'paused') && <Button size="touch" onClick={() => ask(sittingAskings.close(board))}>Close</Button>}
      {state === 'closed' && <Button size="touch" look="main" onClick={() => ask(sittingAskings.reconcile(board))}>Sign the register</Button>}
    </div>
  );
}

function countsOf(board: BoardSnapshot, now: number): TallyCount[] {
  const byState = candidateStates.map((state) => ({ state, count: board.seats.filter((seat) => seat.state === state).length }));
  const signals = (['lost contact', 'help called'] as const).map((signal) => ({ signal, count: board.seats.filter((seat) => signalOf(seat, now) === signal).length }));
  return [
    ...signals.filter((one) => one.count > 0).map(({ signal, count }) => ({ key: signal, count, mark: <StateMark thing="signal" state={signal} /> })),
    ...byState.filter((one) => one.count > 0).map(({ state, count }) => ({ key: state, count, mark: <StateMark thing="candidate" state={state} /> })),
  ];
}

/** The board's head: what and where, what can be done with the whole sitting, and the counts. */
export function BoardHead({ board, now, live, time, ask, run }: HeadProps) {
  const { sitting } = board;
  const longest = Math.max(0, ...board.seats.filter((seat) => seat.state === 'writing').map((seat) => leftAt(seat, now)));
  const needed = Math.ceil(board.seats.length / board.candidatesPerProctor);
  return (
    <>
      <div className="page__head">
        <div>
          <Link className="page__back" href={`/sittings/${sitting.id}`}>Sitting</Link>
          <h1>{sitting.title}</h1>
          <p>Room {sitting.room} · class {sitting.className} · {dayInWords(board)}, {whenInWords(board, time)} · <StateMark thing="sitting" state={sitting.state} small /></p>
        </div>
        {board.mayRun && <Acts board={board} ask={ask} run={run} />}
      </div>
      {live === false && <Notice kind="wait" live>The live line to the server is down; the board asks every few seconds instead.</Notice>}
      {board.mayRun && board.proctors.length < needed && (
        <Notice kind="wait">{board.proctors.length === 1 ? 'One proctor' : `${board.proctors.length} proctors`} for {board.seats.length} candidates; the school asks for one to {board.candidatesPerProctor}.</Notice>
      )}
      <Tally label="Candidates by state" counts={countsOf(board, now)} {...(longest > 0 ? { end: { figure: clockText(longest), says: 'left in the room' } } : {})} />
    </>
  );
}
