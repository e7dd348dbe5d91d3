'use client';

import { useId } from 'react';
import { Button } from '@/components/ui/Button';
import { Modal } from '@/components/ui/Dialog';
import { Notice } from '@/components/ui/Notice';
import type { OutboxView } from '@/lib/candidates/outbox';
import type { RoomView } from '@/lib/candidates/room';
import type { Desk } from './PaperSheet';
import { blanks } from './strip';

type HandInProps = { open: boolean; onClose: () => void; desk: Desk; view: RoomView; outbox: OutboxView; go: (number: number) => void };

/** The last look before handing in: what is blank, what is flagged, what is not on the server yet. */
export function HandIn({ open, onClose, desk, view, outbox, go }: HandInProps) {
  const heading = useId();
  const blank = blanks(view.paper?.questions ?? [], outbox);
  const flagged = [...view.flags].sort((a, b) => a - b);
  const goTo = (number: number) => {
    onClose();
    go(number);
  };
  return (
    <Modal open={open} onClose={onClose} labelledBy={heading} describedBy={`${heading}-says`}>
      <h2 id={heading}>Hand in your paper?</h2>
      <p className="dialog__text" id={`${heading}-says`}>After that nothing can be changed. Time that is left is given up.</p>
      {blank.length === 0 ? (
        <Notice kind="ok">Every part has an answer.</Notice>
      ) : (
        <>
          <Notice kind="wait" title={`${blank.length} ${blank.length === 1 ? 'question has' : 'questions have'} blank parts.`} />
          <ul className="lines">
            {blank.map((row) => (
              <li key={row.number}>
                <button type="button" className="btn btn--quiet" onClick={() => goTo(row.number)}>Question {row.number}: {row.parts.length === 1 ? 'part' : 'parts'} {row.parts.join(', ')} blank</button>
              </li>
            ))}
          </ul>
        </>
      )}
      {flagged.length > 0 && <p>Flagged for later: {flagged.map((number) => `question ${number}`).join(', ')}.</p>}
      {outbox.waiting > 0 && <Notice kind="wait">{outbox.waiting} {outbox.waiting === 1 ? 'answer is' : 'answers are'} not on the server yet; {view.contact ? 'they are sent first.' : 'there is no contact just now.'}</Notice>}
      {view.says && <Notice kind="stop" live>{view.says}</Notice>}
      <div className="dialog__do">
        <Button size="exam" data-first="true" onClick={onClose}>Go on working</Button>
        <Button size="exam" look="main" busy={view.busy} onClick={() => void desk.handIn().then((handed) => (handed ? onClose() : undefined))}>Hand in</Button>
      </div>
    </Modal>
  );
}
