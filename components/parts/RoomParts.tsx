'use client';

import { useState } from 'react';
import { AnswerBox } from '@/components/ui/AnswerBox';
import { Choice } from '@/components/ui/Choice';
import { Clock } from '@/components/ui/Clock';
import { QuestionStrip, type StripQuestion } from '@/components/ui/QuestionStrip';
import { Seat } from '@/components/ui/Seat';
import { TimeBar } from '@/components/ui/TimeBar';
import { Section } from './Section';

const questions: StripQuestion[] = [
  { number: 1, state: 'answered' },
  { number: 2, state: 'flagged' },
  { number: 3, state: 'in part', says: '2 of 3' },
  { number: 4, state: 'kept here' },
  ...Array.from({ length: 8 }, (_, at): StripQuestion => ({ number: at + 5, state: 'blank' })),
];

function Clocks() {
  const [hidden, setHidden] = useState(false);
  return (
    <div className="grid gap-6 md:grid-cols-3">
      <div className="border border-rule">
        <TimeBar seconds={4360} allowed={7200} />
        <div className="p-3">
          <Clock seconds={4360} says="left · ends 11:25" hidden={hidden} onHide={setHidden} />
        </div>
      </div>
      <div className="border border-rule">
        <TimeBar seconds={288} allowed={7200} />
        <div className="p-3">
          <Clock seconds={288} says="left · ends 11:25" />
        </div>
      </div>
      <div className="border border-rule">
        <TimeBar seconds={4360} allowed={7200} stopped />
        <div className="p-3">
          <Clock seconds={4360} says="stopped by the proctor" stopped />
        </div>
      </div>
    </div>
  );
}

function Answers() {
  const [choice, setChoice] = useState('b');
  return (
    <>
      <div className="grid gap-6 md:grid-cols-3">
        <AnswerBox aria-label="Blank" reads="number and unit" state="blank" />
        <AnswerBox
          aria-label="Sending"
          defaultValue="0.2416 kV"
          reads={
            <>
              reads as <b>241.6 volts</b>
            </>
          }
          state="sending"
        />
        <AnswerBox
          aria-label="Saved"
          defaultValue="221,4 V"
          reads={
            <>
              reads as <b>221.4 volts</b>
            </>
          }
          state="saved"
        />
        <AnswerBox
          aria-label="No contact"
          defaultValue="1k5"
          reads={
            <>
              reads as <b>1,500 ohms</b>
            </>
          }
          state="kept here"
        />
        <AnswerBox aria-label="Unread" defaultValue="22..4 V" reads="write one number and a unit" state="cannot be read" />
        <AnswerBox aria-label="Paused" defaultValue="60 A" reads="kept, the sitting is paused" state="paused" disabled />
      </div>
      <Choice
        label="What the motor does"
        row
        value={choice}
        onChange={setChoice}
        options={[
          { value: 'a', text: 'Coasts to rest' },
          { value: 'b', text: 'Overspeeds' },
          { value: 'c', text: 'Surges, then stalls' },
          { value: 'd', text: 'Runs on unchanged' },
        ]}
      />
    </>
  );
}

export function RoomParts() {
  const [here, setHere] = useState(3);
  return (
    <Section title="The room">
      <Clocks />
      <div className="sheet">
        <QuestionStrip questions={questions} here={here} onGo={setHere} />
        <p className="p-6">Question {here}</p>
      </div>
      <Answers />
    </Section>
  );
}

export function SeatParts() {
  const [selected, setSelected] = useState(true);
  const progress = { answered: 7, of: 12 };
  return (
    <Section title="Seat">
      <div className="seats">
        <Seat person={{ seat: 'A1', name: 'A. Abara' }} state="writing" progress={progress} left="1:12:40" />
        <Seat person={{ seat: 'A5', name: 'E. Quill', need: '+25 %' }} state="writing" progress={progress} left="1:42:40" />
        <Seat person={{ seat: 'C2', name: 'H. Amari', need: 'rest' }} state="on rest break" progress={progress} left="stopped" />
        <Seat
          person={{ seat: 'B4', name: 'D. Varga' }}
          state="writing"
          signal="lost contact"
          progress={progress}
          left="1:12:40"
          select={{ selected, onSelect: () => setSelected(!selected) }}
        />
        <Seat person={{ seat: 'A4', name: 'J. Petrov' }} state="writing" signal="help called" progress={progress} left="1:12:40" />
        <Seat person={{ seat: 'C5', name: 'G. Dufresne' }} state="handed in" progress={{ answered: 12, of: 12 }} left="10:11" />
        <Seat person={{ seat: 'D6', name: 'U. Kowal' }} state="expected" progress={{ answered: 0, of: 12 }} left="" />
        <Seat person={{ seat: 'D4', name: 'Y. Ilves' }} state="paused" progress={progress} left="stopped" />
      </div>
    </Section>
  );
}
