'use client';

import { AnswerBox } from '@/components/ui/AnswerBox';
import type { StateOf } from '@/components/ui/states';
import type { Notation } from '@/lib/numeric/notation';
import { type Reading, readNumber } from '@/lib/numeric/reader';
import { parseUnit } from '@/lib/numeric/units';

type AnswerFieldProps = {
  /** Element that asks: the part's letter and question. */
  labelledBy: string;
  asked: { unit: string; ratio?: boolean; notation: Notation };
  value: string;
  state: StateOf<'response'>;
  onWrite?: (text: string) => void;
};

function Echo({ reading, bare }: { reading: Reading | null; bare: boolean }) {
  if (!reading || (!reading.ok && reading.code === 'blank')) return <>{bare ? 'a number' : 'number and unit'}</>;
  if (!reading.ok) return <>{reading.says}</>;
  return (
    <>
      reads as <b>{`${reading.shown.value} ${reading.shown.unit}`.trim()}</b>
      {reading.ambiguous ? `, or ${reading.ambiguous.says}` : null}
    </>
  );
}

/** A number and its unit in one field, with what was understood beneath it and where the answer is. */
export function AnswerField({ labelledBy, asked, value, state, onWrite }: AnswerFieldProps) {
  const unit = parseUnit(asked.unit);
  const reading = unit ? readNumber(value, { unit, notation: asked.notation, ...(asked.ratio ? { ratio: true } : {}) }) : null;
  const unread = reading !== null && !reading.ok && reading.code !== 'blank';
  return (
    <AnswerBox
      aria-labelledby={labelledBy}
      value={value}
      maxLength={200}
      inputMode="text"
      enterKeyHint="next"
      readOnly={!onWrite}
      onChange={(event) => onWrite?.(event.target.value)}
      reads={<Echo reading={reading} bare={unit?.symbol === ''} />}
      state={unread && state !== 'kept here' ? 'cannot be read' : state}
    />
  );
}
