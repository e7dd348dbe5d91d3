'use client';

import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { Button } from '@/components/ui/Button';
import { clockText } from '@/components/ui/clock-text';
import { Pairs, type Pair } from '@/components/ui/Pairs';
import { StateMark } from '@/components/ui/StateMark';
import { Timeline } from '@/components/ui/Timeline';
import type { BoardSeat, BoardSnapshot } from '@/lib/sittings/board-model';
import { fetchTimeline, timelineKey } from '@/lib/sittings/client';
import type { BoardAction } from '@/lib/sittings/board-actions';
import type { Asking } from './ActionDialog';
import { seatAskings } from './askings';
import { eventInWords, leftAt, progressOf, signalOf } from './look';

type PanelProps = { board: BoardSnapshot; seat: BoardSeat; now: number; time: (at: number) => string; ask: (asking: Asking) => void; run: (action: BoardAction) => void };

function factsOf({ board, seat, now, time }: Pick<PanelProps, 'board' | 'seat' | 'now' | 'time'>): Pair[] {
  const progress = progressOf(seat, board);
  return [
    { label: 'Learner number', value: seat.learnerNumber ?? '–' },
    { label: 'Answered', value: `${progress.answered} of ${progress.of} questions` },
    { label: 'Last heard', value: seat.heardAt === null ? 'not yet' : `${Math.max(0, Math.round((now - seat.heardAt) / 1000))} s ago` },
    { label: 'Time left', value: seat.endedAt === null ? clockText(leftAt(seat, now)) : `ended ${time(seat.endedAt)}` },
    ...(seat.endsAt === null ? [] : [{ label: 'Ends', value: time(seat.endsAt) }]),
    { label: 'Time allowed', value: `${Math.round(seat.secondsAllowed / 60)} min` },
    ...(seat.need ? [{ label: 'Need', value: seat.need }] : []),
    ...(seat.restSecondsLeft > 0 ? [{ label: 'Rest left', value: `${Math.floor(seat.restSecondsLeft / 60)} min` }] : []),
    { label: 'Declaration', value: seat.declared ? 'agreed' : 'not yet' },
    ...(seat.claims > 0 ? [{ label: 'Came after the end', value: `${seat.claims} to decide` }] : []),
  ];
}

function Acts({ board, seat, ask, run }: PanelProps) {
  const { state } = seat;
  const inRoom = ['check-in', 'running', 'paused'].includes(board.sitting.state);
  const running = board.sitting.state === 'running';
  const id = seat.candidateId;
  const offers: [boolean, string, () => void, ('main' | 'stop')?][] = [
    [inRoom && (state === 'expected' || state === 'refused' || state === 'absent'), 'Admit', () => run({ do: 'admit', candidates: [id] }), 'main'],
    [running && state === 'admitted', 'Start', () => ask(seatAskings.startLate(seat)), 'main'],
    [seat.helpCalled, 'Call answered', () => run({ do: 'answer-help', candidate: id }), 'main'],
    [running && state === 'paused', 'Resume', () => run({ do: 'resume-one', candidate: id }), 'main'],
    [running && state === 'on rest break', 'End rest break', () => run({ do: 'end-rest', candidate: id }), 'main'],
    [running && state === 'writing', 'Pause', () => ask(seatAskings.pause(seat))],
    [running && state === 'writing' && seat.restSecondsLeft > 0, 'Rest break', () => run({ do: 'begin-rest', candidate: id })],
    [inRoom && ['admitted', 'writing', 'paused', 'on rest break'].includes(state), 'More time', () => ask(seatAskings.addTime(seat))],
    [board.sitting.state !== 'planned', 'Incident', () => ask(seatAskings.incident(seat))],
    [inRoom && seat.hasDevice && ['admitted', 'writing', 'paused', 'on rest break'].includes(state), 'Other device', () => ask(seatAskings.transfer(seat))],
    [running && (state === 'handed in' || state === 'timed out'), 'Reopen', () => ask(seatAskings.reopen(seat))],
    [inRoom && state === 'expected', 'Turn away', () => ask(seatAskings.refuse(seat)), 'stop'],
    [inRoom && ['admitted', 'writing', 'paused', 'on rest break'].includes(state), 'Withdraw', () => ask(seatAskings.withdraw(seat)), 'stop'],
  ];
  return (
    <div className="side__acts">
      {offers.filter(([offered]) => offered).map(([, label, act, look]) => (
        <Button key={label} size="touch" onClick={act} {...(look ? { look } : {})}>{label}</Button>
      ))}
    </div>
  );
}

function CandidateTimeline({ board, seat, time }: Pick<PanelProps, 'board' | 'seat' | 'time'>) {
  const { data } = useQuery({
    queryKey: timelineKey(board.sitting.id, seat.candidateId, board.number),
    queryFn: () => fetchTimeline(board.sitting.id, seat.candidateId),
    placeholderData: (before) => before,
  });
  const entries = (data ?? []).map((entry) => ({
    key: String(entry.number), at: time(entry.at), machine: new Date(entry.at).toISOString(),
    says: <>{eventInWords(entry.kind, entry.data)}{entry.words ? `: ${entry.words}` : ''}{entry.actor ? <span className="soft"> · {entry.actor}</span> : null}</>,
  }));
  return entries.length > 0 ? <Timeline entries={entries} /> : <p className="soft t15">Nothing yet.</p>;
}

/** One candidate at the side of the board: facts, what can be done now, and the time line. */
export function CandidatePanel(props: PanelProps) {
  const { board, seat, now } = props;
  const signal = signalOf(seat, now);
  const panel = useRef<HTMLElement>(null);
  // On a tablet the panel lies beneath the seats.
  useEffect(() => {
    void panel.current?.scrollIntoView({ block: 'nearest' });
  }, [seat.candidateId]);
  return (
    <aside ref={panel} className="sheet side" aria-label={`Candidate ${seat.name}`}>
      <div className="side__top"><span className="mono soft">{seat.seat || 'no seat'}</span>{seat.need && <span className="need">{seat.need}</span>}</div>
      <h2>{seat.name}</h2>
      <div className="btn-row">
        <StateMark thing="candidate" state={seat.state} />
        {signal && <StateMark thing="signal" state={signal} />}
        {seat.incidents > 0 && <StateMark thing="signal" state="incident noted">{seat.incidents} {seat.incidents === 1 ? 'incident' : 'incidents'}</StateMark>}
      </div>
      <Pairs pairs={factsOf(props)} />
      {board.mayRun && <Acts {...props} />}
      <h3 className="cap">Time line</h3>
      <CandidateTimeline board={board} seat={seat} time={props.time} />
    </aside>
  );
}
