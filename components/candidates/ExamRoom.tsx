'use client';

import { useEffect, useState, useSyncExternalStore } from 'react';
import { Button } from '@/components/ui/Button';
import { timeIn } from '@/components/ui/clock-text';
import { Notice } from '@/components/ui/Notice';
import { keepShell } from '@/lib/candidates/offline-shell';
import { Room, type RoomView } from '@/lib/candidates/room';
import { CoverSheet } from './CoverSheet';
import { PaperSheet } from './PaperSheet';
import { RoomMessage } from './RoomMessage';

/** The exam room of one sitting. Everything it shows comes from the room's own store; it works on through a lost network. */
export function ExamRoom({ sittingId }: { sittingId: string }) {
  const [room] = useState(() => new Room(sittingId));
  useEffect(() => {
    void room.enter();
    // A development build renames nothing when it changes: kept files would be stale.
    if (process.env.NODE_ENV === 'production') void keepShell().catch(() => undefined);
    return () => room.leave();
  }, [room]);
  return <RoomPhases room={room} />;
}

const Entering = () => (
  <RoomMessage title="One moment" cover={null}>
    <p>The room is being opened.</p>
  </RoomMessage>
);

const toToday = <a className="btn btn--lg" href="/today">Back to Today</a>;

function Ended({ view, waiting }: { view: RoomView; waiting: number }) {
  const { state, cover } = view;
  const at = state?.endedAt && cover ? timeIn(state.endedAt, cover.zoneOffset) : null;
  const how = { 'handed in': 'Your paper is handed in', 'timed out': 'Your time is over', withdrawn: 'You were taken out of this sitting' }[state?.state as string] ?? 'This sitting is over for you';
  return (
    <RoomMessage title={how} cover={cover} action={toToday}>
      {at && <p>It ended at {at}. You will find the result under My results once it is released.</p>}
      {waiting > 0 ? (
        <Notice kind="wait" title={`${waiting} ${waiting === 1 ? 'answer is' : 'answers are'} only on this device.`}>
          {' '}Keep this window open and tell the proctor before you leave.
        </Notice>
      ) : (
        <p>Everything you wrote is on the server. You may close this window.</p>
      )}
    </RoomMessage>
  );
}

/** What there is to show in each phase. */
function RoomPhases({ room }: { room: Room }) {
  const view = useSyncExternalStore(room.subscribe, room.snapshot, room.snapshot);
  const outbox = useSyncExternalStore(room.outbox.subscribe, room.outbox.snapshot, room.outbox.snapshot);
  const { cover, state } = view;
  switch (view.phase) {
    case 'entering': return <Entering />;
    case 'no-contact':
      return <RoomMessage title="There is no contact with the server" cover={cover}><p>It is tried again by itself. If this lasts, tell the proctor.</p></RoomMessage>;
    case 'signed-out':
      return (
        <RoomMessage title="You are signed out" cover={cover} action={<a className="btn btn--main btn--lg" href={`/sign-in?next=/sit/${room.sittingId}`}>Sign in</a>}>
          <p>Sign in again to come back to your paper. {outbox.waiting > 0 ? 'What you wrote is kept on this device and sent then.' : ''}</p>
        </RoomMessage>
      );
    case 'not-here': return <RoomMessage title="There is no paper of yours here" cover={cover} action={toToday}><p>Look at Today for your sittings, or ask the proctor.</p></RoomMessage>;
    case 'other-window':
      return <RoomMessage title="Your paper is open in another window" cover={cover} action={<Button size="exam" onClick={() => location.reload()}>Try again here</Button>}><p>Go back to that window, or close it and try again here.</p></RoomMessage>;
    case 'other-device': return <RoomMessage title="Your paper is on another device" cover={cover}><p>{view.says} If that is not right, call the proctor: only they can move it here.</p></RoomMessage>;
    case 'refused': return <RoomMessage title="You are not admitted" cover={cover} action={toToday}><p>Speak to the proctor. If you are admitted after all, this page goes on by itself.</p></RoomMessage>;
    case 'waiting':
      return (
        <RoomMessage title="Wait to be admitted" cover={cover} action={toToday}>
          <p>{cover && `The sitting starts at ${timeIn(cover.startsAt, cover.zoneOffset)}. `}Show your photo identification to the proctor. This page goes on by itself.</p>
        </RoomMessage>
      );
    case 'cover': return <CoverSheet room={room} view={view} />;
    case 'stopped':
      return (
        <RoomMessage title={state?.state === 'on rest break' ? 'Rest break' : 'The clock stands'} cover={cover}>
          <p>{state?.state === 'on rest break' ? 'Your paper is covered and your time does not run. The proctor ends the break.' : 'The proctor has stopped the sitting. Your paper is covered and your time is kept to the second.'}</p>
          {outbox.waiting > 0 && <p>{outbox.waiting} {outbox.waiting === 1 ? 'answer is' : 'answers are'} kept here and sent when the clock runs again.</p>}
        </RoomMessage>
      );
    case 'ended': return <Ended view={view} waiting={outbox.waiting} />;
    case 'writing': return view.paper ? <PaperSheet room={room} view={view} outbox={outbox} /> : <Entering />;
  }
}
