'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { useConfirm } from '@/components/ui/Confirm';
import { Notice } from '@/components/ui/Notice';
import { TextArea } from '@/components/ui/TextArea';
import type { ExamState } from '@/lib/exams/model';
import type { Result } from '@/lib/result';

export type ReviewActions = {
  ask: (input: { examId: string; revision: number }) => Promise<Result<unknown>>;
  giveBack: (input: { examId: string; note: string }) => Promise<Result<unknown>>;
  approve: (input: { examId: string; revision: number; note: string }) => Promise<Result<unknown>>;
  retire: (input: { examId: string }) => Promise<Result<unknown>>;
};
type Exam = { id: string; state: ExamState; revision: number; reviewNote: string; reviewAskedBy: string | null; mayDecide: boolean };
type Props = { exam: Exam; unsaved: boolean; stopped: boolean; actions: ReviewActions };

const unreachable = 'The server did not answer. Try again in a moment.';

function useAct() {
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const [refused, setRefused] = useState<string | null>(null);
  const act = async (work: () => Promise<Result<unknown>>) => {
    setBusy(true);
    setRefused(null);
    const result = await work().catch(() => null);
    setBusy(false);
    if (result?.ok) router.refresh();
    else setRefused(result?.says ?? unreachable);
  };
  return { act, busy, refused };
}

function Draft({ exam, unsaved, stopped, act, ask, busy }: Props & { act: (work: () => Promise<Result<unknown>>) => void; ask: ReviewActions['ask']; busy: boolean }) {
  const why = unsaved ? 'Save first.' : stopped ? 'Put right what is listed above first.' : 'A second instructor reads it and approves it or returns it.';
  return (
    <>
      {exam.reviewNote && <Notice kind="wait" title="Returned:">{' '}{exam.reviewNote}</Notice>}
      <p className="mt-2 text-15 text-ink-soft">{why}</p>
      <div className="btn-row mt-3"><Button look="main" disabled={unsaved || stopped} busy={busy} onClick={() => act(() => ask({ examId: exam.id, revision: exam.revision }))}>Ask for review</Button></div>
    </>
  );
}

function InReview({ exam, actions, act, busy }: Props & { act: (work: () => Promise<Result<unknown>>) => void; busy: boolean }) {
  const [note, setNote] = useState('');
  return (
    <div className="grid gap-3">
      <p className="text-15">{exam.reviewAskedBy} asked for a review. The text stands still until it is decided.</p>
      {exam.mayDecide ? (
        <TextArea label="Note" optional rows={3} help="Needed where you return it." value={note} maxLength={2_000} onChange={(event) => setNote(event.target.value)} />
      ) : (
        <p className="text-15 text-ink-soft">You wrote on it or asked for the review, so another instructor decides.</p>
      )}
      <div className="btn-row">
        {exam.mayDecide && <Button look="main" busy={busy} onClick={() => act(() => actions.approve({ examId: exam.id, revision: exam.revision, note }))}>Approve</Button>}
        <Button busy={busy} onClick={() => act(() => actions.giveBack({ examId: exam.id, note }))}>{exam.mayDecide ? 'Return' : 'Take it back'}</Button>
      </div>
    </div>
  );
}

/** Where the exam stands in its review, and what the reader may do about it. */
export function ReviewPanel(props: Props) {
  const { exam, actions } = props;
  const { act, busy, refused } = useAct();
  const [ask, question] = useConfirm();
  const retire = async () => {
    const yes = await ask({ title: 'Retire this exam?', says: 'No new sitting can be scheduled with its forms. Sittings that are scheduled stay.', verb: 'Retire', look: 'stop' });
    if (yes) await act(() => actions.retire({ examId: exam.id }));
  };
  return (
    <section className="section section--cap" aria-labelledby="review-head">
      <h2 id="review-head">Review</h2>
      <div className="pt-3">
        {exam.state === 'draft' && <Draft {...props} ask={actions.ask} act={act} busy={busy} />}
        {exam.state === 'in review' && <InReview {...props} act={act} busy={busy} />}
        {exam.state === 'approved' && (
          <>
            <p className="text-15">Approved and frozen. A change that you save begins the draft of the next form.</p>
            <div className="btn-row mt-3"><Button look="stop" busy={busy} onClick={() => void retire()}>Retire the exam</Button></div>
          </>
        )}
        {exam.state === 'retired' && <p className="text-15">Retired: it is kept for the record and cannot be scheduled.</p>}
        {refused && <div className="mt-3"><Notice kind="stop" live>{refused}</Notice></div>}
        {question}
      </div>
    </section>
  );
}
