'use client';

import { useEffect, useMemo, useState, useSyncExternalStore } from 'react';
import { Button } from '@/components/ui/Button';
import { LinkButton } from '@/components/ui/LinkButton';
import { Sign } from '@/components/ui/Sign';
import { Outbox } from '@/lib/candidates/outbox';
import { checkDevice, type DeviceCheck, rehearsalPaper } from '@/lib/candidates/rehearsal';
import type { RoomView } from '@/lib/candidates/room';
import { type Desk, PaperSheet } from './PaperSheet';
import { RoomMessage } from './RoomMessage';

type RehearsalProps = { name: string; now: number; place: { zoneOffset: number; locale: string }; done: () => Promise<unknown> };

const nowhere = { keepEntry: async () => undefined };

/** A desk that acts like the room's, with nothing behind it: answers are "saved" after half a second. */
function useRehearsalDesk({ name, now, place, done }: RehearsalProps) {
  const [began] = useState(() => performance.now());
  const [flags, setFlags] = useState<ReadonlySet<number>>(new Set());
  const [helpCalled, setHelpCalled] = useState(false);
  const [ended, setEnded] = useState(false);
  const clock = useMemo(() => () => now + performance.now() - began, [now, began]);
  const outbox = useMemo(() => new Outbox({
    save: async (revisions) => {
      await new Promise((resolve) => setTimeout(resolve, 500));
      return { ok: true, now: clock(), saved: revisions };
    },
  }, nowhere, clock), [clock]);
  const desk: Desk = useMemo(() => ({
    now: clock, outbox,
    toggleFlag: async (question) => setFlags((before) => {
      const after = new Set(before);
      if (!after.delete(question)) after.add(question);
      return after;
    }),
    callHelp: async () => setHelpCalled(true),
    handIn: async () => {
      setEnded(true);
      await done();
      return true;
    },
  }), [clock, outbox, done]);
  const cover = { sittingId: '', title: 'Rehearsal', room: 'anywhere', candidateName: name, minutes: 20, startsAt: now, ...place, instructionsHtml: '', declaration: '', materials: [], passRule: [] };
  const seconds = rehearsalPaper.minutes * 60;
  const view: RoomView = {
    phase: 'writing', cover, paper: rehearsalPaper, flags, contact: true, busy: false, says: '',
    state: { candidateId: '', state: 'writing', sittingState: 'running', epoch: 1, now, endsAt: now + seconds * 1000, secondsLeft: null, secondsAllowed: seconds, startedAt: now, endedAt: null, seat: '', helpCalled, declared: true },
  };
  return { desk, outbox, view, ended, cover };
}

function DeviceChecks({ now }: { now: number }) {
  const [checks, setChecks] = useState<DeviceCheck[]>([]);
  useEffect(() => {
    const made = performance.now();
    void checkDevice(now, performance.now() - made).then(setChecks);
  }, [now]);
  return (
    <ul className="lines">
      {checks.map((check) => (
        <li key={check.key}><Sign shape={check.ok ? 'check' : 'sq-bang'} tone={check.ok ? 'ok' : 'wait'}>{check.label}</Sign> {check.says}</li>
      ))}
    </ul>
  );
}

/** The rehearsal: what this device can do, then a dummy paper in the room as it will be. */
export function Rehearsal(props: RehearsalProps) {
  const [begun, setBegun] = useState(false);
  const { desk, outbox, view, ended, cover } = useRehearsalDesk(props);
  const shown = useSyncExternalStore(outbox.subscribe, outbox.snapshot, outbox.snapshot);
  if (ended) {
    return (
      <RoomMessage title="The rehearsal is over" cover={cover} action={<LinkButton size="exam" look="main" href="/today" document>Back to Today</LinkButton>}>
        <p>That is all there is to it. Nothing of it was kept but that you have rehearsed.</p>
      </RoomMessage>
    );
  }
  if (!begun) {
    return (
      <RoomMessage title="Rehearse on a dummy paper" cover={null} action={<><Button size="exam" look="main" onClick={() => setBegun(true)}>Begin the rehearsal</Button><LinkButton size="exam" href="/today" document>Back to Today</LinkButton></>}>
        <p>It looks and works like the exam room: clock, flag, formula sheet, hand in. Nothing is marked.</p>
        <h2>This device</h2>
        <DeviceChecks now={props.now} />
      </RoomMessage>
    );
  }
  return <PaperSheet room={desk} view={view} outbox={shown} />;
}
