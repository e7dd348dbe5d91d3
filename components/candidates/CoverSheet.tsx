'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { timeIn } from '@/components/ui/clock-text';
import { MathText } from '@/components/ui/MathText';
import { Notice } from '@/components/ui/Notice';
import { RatingPlate } from '@/components/ui/RatingPlate';
import type { Room, RoomView } from '@/lib/candidates/room';

const minutes = (seconds: number): string => `${Math.round(seconds / 60)} min`;

const Lines = ({ title, lines }: { title: string; lines: readonly string[] }) => (
  <>
    <h2>{title}</h2>
    <ul className="lines">
      {lines.map((line) => (
        <li key={line}>{line}</li>
      ))}
    </ul>
  </>
);

/** Admitted, before the start: who, where, how long, the declaration; the paper opens by itself when the proctor starts. */
export function CoverSheet({ room, view }: { room: Room; view: RoomView }) {
  const [agreed, setAgreed] = useState(false);
  const { cover, state } = view;
  if (!cover || !state) return null;
  const cells = [
    { label: 'Candidate', value: cover.candidateName },
    { label: 'Room', value: cover.room },
    { label: 'Seat', value: state.seat || 'any' },
    { label: 'Time for you', value: minutes(state.secondsAllowed) },
    { label: 'Planned start', value: timeIn(cover.startsAt, cover.zoneOffset) },
  ];
  return (
    <div className="room">
      <main className="room__main" id="main" tabIndex={-1}>
        <div className="sheet room__body room__message">
          <p className="soft t15">You are admitted</p>
          <h1>{cover.title}</h1>
          <RatingPlate kind="record" label="Your place" cells={cells} />
          {cover.instructionsHtml && <MathText html={cover.instructionsHtml} />}
          {cover.materials.length > 0 && <Lines title="On the bench" lines={cover.materials} />}
          {cover.passRule.length > 0 && <Lines title="To pass" lines={cover.passRule} />}
          {state.declared ? (
            <Notice kind="ok" live title="You agreed to the declaration.">{' '}The paper opens by itself when the proctor starts the sitting.</Notice>
          ) : (
            <form
              className="declaration"
              onSubmit={(event) => {
                event.preventDefault();
                void room.declare();
              }}
            >
              <h2>Declaration</h2>
              <p className="t18">{cover.declaration}</p>
              <label className="check">
                <input type="checkbox" className="tick" checked={agreed} onChange={(event) => setAgreed(event.target.checked)} />
                <span>I agree</span>
              </label>
              <div className="btn-row">
                <Button type="submit" look="main" size="exam" disabled={!agreed} busy={view.busy}>Confirm the declaration</Button>
              </div>
            </form>
          )}
          {!view.contact && <Notice kind="wait" live>There is no contact with the server just now; it is tried again by itself.</Notice>}
          {view.says && <Notice kind="stop" live>{view.says}</Notice>}
        </div>
      </main>
    </div>
  );
}
