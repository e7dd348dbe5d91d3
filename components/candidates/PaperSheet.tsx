'use client';

import { useEffect, useRef, useState } from 'react';
import { RoomShell } from '@/components/shell/RoomShell';
import { ViewSwitch } from '@/components/shell/ViewSwitch';
import { Button } from '@/components/ui/Button';
import { Clock } from '@/components/ui/Clock';
import { timeIn } from '@/components/ui/clock-text';
import { Dialog } from '@/components/ui/Dialog';
import { MathText } from '@/components/ui/MathText';
import { Notice } from '@/components/ui/Notice';
import { QuestionStrip } from '@/components/ui/QuestionStrip';
import { StateMark } from '@/components/ui/StateMark';
import { TimeBar } from '@/components/ui/TimeBar';
import { type OutboxView, placeOf } from '@/lib/candidates/outbox';
import type { Room, RoomView } from '@/lib/candidates/room';
import { notationOf } from '@/lib/numeric/notation';
import { HandIn } from './HandIn';
import { QuestionSheet } from './QuestionSheet';
import { stripOf } from './strip';
import { useServerNow } from './use-clock';

/** What a sheet works on: the room of a sitting, or a rehearsal that acts like one. */
export type Desk = Pick<Room, 'now' | 'toggleFlag' | 'callHelp' | 'handIn'> & { outbox: { write(question: number, part: string, text: string): Promise<void> } };
type PaperSheetProps = { room: Desk; view: RoomView; outbox: OutboxView };

/** Which question is open; kept in the address, so that a reload comes back to it. */
function useQuestion(count: number): [number, (number: number) => void] {
  const [here, setHere] = useState(() => {
    const asked = Number(location.hash.replace('#question-', ''));
    return Number.isInteger(asked) && asked >= 1 && asked <= count ? asked : 1;
  });
  const go = (number: number) => {
    const next = Math.max(1, Math.min(count, number));
    history.replaceState(null, '', `#question-${next}`);
    setHere(next);
    scrollTo({ top: 0 });
    requestAnimationFrame(() => document.getElementById('question-head')?.focus({ preventScroll: true }));
  };
  return [here, go];
}

function Whereabouts({ outbox, contact }: { outbox: OutboxView; contact: boolean }) {
  const { waiting } = outbox;
  const answers = `${waiting} ${waiting === 1 ? 'answer' : 'answers'}`;
  if (waiting === 0) return contact ? <StateMark thing="response" state="saved">all saved</StateMark> : <StateMark thing="signal" state="lost contact">no contact</StateMark>;
  return contact ? <StateMark thing="response" state="sending">{answers} sending</StateMark> : <StateMark thing="response" state="kept here">{answers} only here</StateMark>;
}

function Foot({ desk, view, here, go }: { desk: Desk; view: RoomView; here: number; go: (number: number) => void }) {
  const [open, setOpen] = useState<'formulas' | 'view' | null>(null);
  const count = view.paper?.questions.length ?? 0;
  const flagged = view.flags.has(here);
  const formulas = view.paper?.formulaSheetHtml;
  return (
    <>
      {formulas && <Button size="exam" onClick={() => setOpen('formulas')}>Formula sheet</Button>}
      <Button size="exam" look="quiet" disabled={view.state?.helpCalled} onClick={() => void desk.callHelp()}>{view.state?.helpCalled ? 'Proctor called' : 'Call the proctor'}</Button>
      <Button size="exam" look="quiet" onClick={() => setOpen('view')}>View</Button>
      <span className="grow" />
      <Button size="exam" shape="flag" aria-pressed={flagged} className={flagged ? 'is-on' : ''} onClick={() => void desk.toggleFlag(here)}>Flag</Button>
      <Button size="exam" disabled={here === 1} onClick={() => go(here - 1)}>Back</Button>
      <Button size="exam" look="main" disabled={here === count} onClick={() => go(here + 1)}>Next</Button>
      <Dialog open={open === 'formulas'} onClose={() => setOpen(null)} title="Formula sheet" wide>{formulas && <MathText html={formulas} />}</Dialog>
      <Dialog open={open === 'view'} onClose={() => setOpen(null)} title="View"><ViewSwitch /></Dialog>
    </>
  );
}

/** The clock and its bar; alone in being drawn again four times a second. */
function useTime(desk: Desk, view: RoomView) {
  const now = useServerNow(desk.now);
  const end = view.state?.endsAt ?? now;
  return { seconds: Math.max(0, (end - now) / 1000), end };
}

function RoomClock({ desk, view, part }: { desk: Desk; view: RoomView; part: 'bar' | 'clock' }) {
  const [hidden, setHidden] = useState(false);
  const { seconds, end } = useTime(desk, view);
  if (part === 'bar') return <TimeBar seconds={seconds} allowed={view.state?.secondsAllowed ?? 0} />;
  const says = view.cover ? `left · ends ${timeIn(end, view.cover.zoneOffset)}` : 'left';
  return <Clock seconds={seconds} says={says} hidden={hidden} onHide={setHidden} />;
}

/** Shown when the browser's count reaches the end before the server said so: nothing more is taken then. */
function useOver(desk: Desk, view: RoomView): boolean {
  const end = view.state?.endsAt ?? null;
  const [reached, setReached] = useState<number | null>(null);
  useEffect(() => {
    if (end === null) return;
    const look = setInterval(() => setReached(desk.now() >= end ? end : null), 500);
    return () => clearInterval(look);
  }, [desk, end]);
  return end !== null && reached === end;
}

/** The paper while the clock runs: one question at a time, where each answer is, flag, formula sheet, hand in. */
export function PaperSheet({ room, view, outbox }: PaperSheetProps) {
  const questions = view.paper?.questions ?? [];
  const [here, go] = useQuestion(questions.length);
  const [handing, setHanding] = useState(false);
  const over = useOver(room, view);
  const sheet = useRef<HTMLDivElement>(null);
  const question = questions[here - 1];
  if (!question || !view.paper || !view.cover) return null;
  const { cover, paper, state } = view;
  const section = paper.sections.find((one) => one.first <= here && here <= one.last)?.title;
  return (
    <RoomShell
      bar={<RoomClock desk={room} view={view} part="bar" />}
      head={{
        who: <><b>{cover.candidateName}</b><span>{cover.title}{state?.seat ? ` · seat ${state.seat}` : ''}</span></>,
        clock: <RoomClock desk={room} view={view} part="clock" />,
        right: <><Whereabouts outbox={outbox} contact={view.contact} /><Button size="exam" onClick={() => setHanding(true)}>Hand in</Button></>,
      }}
      foot={<Foot desk={room} view={view} here={here} go={go} />}
    >
      <div className="sheet" ref={sheet}>
        <QuestionStrip questions={stripOf(questions, outbox, view.flags)} here={here} onGo={go} />
        <div className="room__body">
          {!view.contact && (
            <Notice kind="wait" live title="There is no contact with the server.">{' '}Go on working: what you write is kept on this device and sent when contact is back.</Notice>
          )}
          {over && <Notice kind="stop" live title="Your time is over.">{' '}What you type now is not taken.</Notice>}
          {view.says && <Notice kind="stop" live>{view.says}</Notice>}
          <QuestionSheet
            key={here}
            question={question}
            headingId="question-head"
            place={{ number: here, of: questions.length, ...(section ? { section } : {}) }}
            notation={notationOf(cover.locale)}
            answering={{
              answerOf: (part) => outbox.answers.get(placeOf(here, part)) ?? '',
              stateOf: (part) => outbox.states.get(placeOf(here, part)) ?? 'blank',
              ...(over ? {} : { onWrite: (part: string, text: string) => void room.outbox.write(here, part, text) }),
            }}
          />
        </div>
      </div>
      <HandIn open={handing} onClose={() => setHanding(false)} desk={room} view={view} outbox={outbox} go={go} />
    </RoomShell>
  );
}
