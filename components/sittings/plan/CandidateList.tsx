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

const heads = (mayPlan: boolean) => [
  { title: 'Candidate', look: '' }, { title: 'Seat', look: '' }, { title: 'Need', look: '' }, { title: 'Time', look: 'n dbl' }, { title: 'Rest', look: 'n' },
  { title: mayPlan ? 'Paper' : 'State', look: 'dbl' }, { title: 'Invitation', look: '' },
];

type RowProps = { candidate: CandidateLine; seat: string; mayPlan: boolean; onSeat: (seat: string) => void; onRemove: () => void };

function Row({ candidate, seat, mayPlan, onSeat, onRemove }: RowProps) {
  return (
    <tr role="row">
      <th scope="row" role="rowheader"><span className="name">{candidate.name}</span>{candidate.learnerNumber && <span className="sub">{candidate.learnerNumber}</span>}</th>
      <td role="cell" data-head="Seat">
        {mayPlan ? <input className="input input--sm input--mono w-20" aria-label={`Seat of ${candidate.name}`} value={seat} maxLength={12} autoComplete="off" onChange={(event) => onSeat(event.target.value)} /> : <span className="num">{candidate.seat || '–'}</span>}
      </td>
      <td role="cell" data-head="Need">{candidate.need ? <span className="need">{candidate.need}</span> : <span className="text-ink-soft">–</span>}</td>
      <td role="cell" className="n dbl" data-head="Time">{candidate.time}</td>
      <td role="cell" className="n" data-head="Rest">{candidate.rest || '–'}</td>
      <td role="cell" className="dbl" data-head={mayPlan ? 'Paper' : 'State'}>{mayPlan ? <StateMark thing="papers" state={candidate.hasPaper ? 'drawn' : 'none'} small /> : <StateMark thing="candidate" state={candidate.state} small />}</td>
      <td role="cell" data-head="Invitation">{candidate.mail ? <StateMark thing="e-mail" state={candidate.mail} small /> : <span className="text-13 text-ink-soft">{candidate.hasEmail ? 'not invited' : 'no address: slip'}</span>}</td>
      {mayPlan && <td role="cell"><Button size="dense" look="quiet" aria-label={`Take ${candidate.name} off the list`} onClick={onRemove}>Take off</Button></td>}
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
      <div className="ledger-scroll">
        <table className="ledger" role="table" aria-labelledby="candidates-head">
          <thead role="rowgroup">
            <tr role="row">
              {heads(mayPlan).map((head) => <th key={head.title} scope="col" role="columnheader" className={head.look}>{head.title}</th>)}
              {mayPlan && <th scope="col" role="columnheader"><span className="vh">Actions</span></th>}
            </tr>
          </thead>
          <tbody role="rowgroup">
            {candidates.map((candidate) => (
              <Row key={candidate.id} candidate={candidate} seat={seatOf(candidate)} mayPlan={mayPlan} onSeat={(seat) => setChanged(new Map(changed).set(candidate.id, seat))} onRemove={() => void takeOff(candidate)} />
            ))}
            {candidates.length === 0 && <tr role="row"><td role="cell" colSpan={mayPlan ? 8 : 7}>Nobody is on the list yet.</td></tr>}
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
