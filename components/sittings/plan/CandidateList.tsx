'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { useConfirm } from '@/components/ui/Confirm';
import { FormGuard } from '@/components/ui/FormGuard';
import { Notice } from '@/components/ui/Notice';
import { StateMark } from '@/components/ui/StateMark';
import type { StateOf } from '@/components/ui/states';
import { defaultSeat } from '@/lib/planning/rules';
import type { Result } from '@/lib/result';
import { useAct } from './use-act';

export type CandidateLine = {
  id: string;
  name: string;
  learnerNumber: string | null;
  seat: string;
  need: string;
  /** "150 min", "15 min": time and rest breaks allowed. */
  time: string;
  rest: string;
  hasPaper: boolean;
  hasEmail: boolean;
  mail: StateOf<'e-mail'> | null;
  state: StateOf<'candidate'>;
};
type Props = {
  sittingId: string;
  candidates: readonly CandidateLine[];
  mayPlan: boolean;
  saveSeats: (input: { sittingId: string; seats: { candidateId: string; seat: string }[] }) => Promise<Result<null>>;
  remove: (input: { sittingId: string; candidateId: string }) => Promise<Result<null>>;
};

function Row({ candidate, seat, mayPlan, onSeat, onRemove }: { candidate: CandidateLine; seat: string; mayPlan: boolean; onSeat: (seat: string) => void; onRemove: () => void }) {
  return (
    <tr>
      <td><span className="name">{candidate.name}</span>{candidate.learnerNumber && <span className="sub">{candidate.learnerNumber}</span>}</td>
      <td>
        {mayPlan ? <input className="input input--sm input--mono w-20" aria-label={`Seat of ${candidate.name}`} value={seat} maxLength={12} autoComplete="off" onChange={(event) => onSeat(event.target.value)} /> : <span className="num">{candidate.seat || '–'}</span>}
      </td>
      <td>{candidate.need ? <span className="need">{candidate.need}</span> : <span className="text-ink-soft">–</span>}</td>
      <td className="n dbl">{candidate.time}</td>
      <td className="n">{candidate.rest || '–'}</td>
      <td className="dbl">{mayPlan ? <StateMark thing="papers" state={candidate.hasPaper ? 'drawn' : 'none'} small /> : <StateMark thing="candidate" state={candidate.state} small />}</td>
      <td>{candidate.mail ? <StateMark thing="e-mail" state={candidate.mail} small /> : <span className="text-13 text-ink-soft">{candidate.hasEmail ? 'not invited' : 'no address: slip'}</span>}</td>
      {mayPlan && <td><Button size="dense" look="quiet" aria-label={`Take ${candidate.name} off the list`} onClick={onRemove}>Take off</Button></td>}
    </tr>
  );
}

/** Candidates with seat, need, time and paper; while it is planned, seats are written here and people taken off. */
export function CandidateList({ sittingId, candidates, mayPlan, saveSeats, remove }: Props) {
  const [changed, setChanged] = useState<ReadonlyMap<string, string>>(new Map());
  const { act, busy, said } = useAct();
  const [ask, question] = useConfirm();
  const seatOf = (candidate: CandidateLine) => changed.get(candidate.id) ?? candidate.seat;
  const dirty = candidates.some((candidate) => seatOf(candidate) !== candidate.seat);
  const byName = () => setChanged(new Map(candidates.map((candidate, place) => [candidate.id, defaultSeat(place)])));
  const save = async () => {
    const seats = candidates.filter((candidate) => seatOf(candidate) !== candidate.seat).map((candidate) => ({ candidateId: candidate.id, seat: seatOf(candidate) }));
    if (await act(() => saveSeats({ sittingId, seats }), () => 'Seats saved.')) setChanged(new Map());
  };
  const takeOff = async (candidate: CandidateLine) => {
    const says = candidate.hasPaper ? 'The paper drawn for this candidate is discarded; nobody has seen it. Put on the list again, they get another one.' : 'They can be put on the list again while the sitting is planned.';
    if (await ask({ title: `Take ${candidate.name} off the list?`, says, verb: 'Take off', look: 'stop' })) await act(() => remove({ sittingId, candidateId: candidate.id }), () => `${candidate.name} is off the list.`);
  };
  return (
    <section aria-labelledby="candidates-head">
      <h2 id="candidates-head" className="mb-3 text-22">Candidates</h2>
      <FormGuard dirty={dirty && !busy} />
      <div className="overflow-x-auto">
        <table className="ledger">
          <thead>
            <tr>
              <th scope="col">Candidate</th><th scope="col">Seat</th><th scope="col">Need</th><th scope="col" className="n dbl">Time</th><th scope="col" className="n">Rest</th>
              <th scope="col" className="dbl">{mayPlan ? 'Paper' : 'State'}</th><th scope="col">Invitation</th>{mayPlan && <th scope="col"><span className="vh">Actions</span></th>}
            </tr>
          </thead>
          <tbody>
            {candidates.map((candidate) => (
              <Row key={candidate.id} candidate={candidate} seat={seatOf(candidate)} mayPlan={mayPlan} onSeat={(seat) => setChanged(new Map(changed).set(candidate.id, seat))} onRemove={() => void takeOff(candidate)} />
            ))}
            {candidates.length === 0 && <tr><td colSpan={mayPlan ? 8 : 7}>Nobody is on the list yet.</td></tr>}
          </tbody>
        </table>
      </div>
      {mayPlan && candidates.length > 0 && (
        <div className="btn-row mt-3">
          <Button look="main" disabled={!dirty} busy={busy} onClick={() => void save()}>Save seats</Button>
          <Button onClick={byName}>Seat by name</Button>
        </div>
      )}
      {said && <div className="mt-3"><Notice kind={said.kind} live>{said.text}</Notice></div>}
      {question}
    </section>
  );
}
