'use client';

import { useId, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Modal } from '@/components/ui/Dialog';
import { Notice } from '@/components/ui/Notice';
import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import type { Result } from '@/lib/result';
import type { BoardAction } from '@/lib/sittings/board-actions';

/** What is asked before an action: the thing, the consequence, which of minutes and words it wants, and the verb. */
export type Asking = {
  title: string;
  says: string;
  verb: string;
  look?: 'stop' | 'main';
  minutes?: { label: string; initial: number };
  words?: { label: string; help?: string; optional?: boolean };
  action: (given: { minutes: number; words: string }) => BoardAction;
};

/** Asks for what an action needs; what was typed stays when it is refused. */
export function ActionDialog({ asking, act, onClose }: { asking: Asking; act: (action: BoardAction) => Promise<Result<null>>; onClose: () => void }) {
  const heading = useId();
  const [minutes, setMinutes] = useState(String(asking.minutes?.initial ?? ''));
  const [words, setWords] = useState('');
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const submit = async () => {
    if (asking.words && !asking.words.optional && words.trim() === '') return setTrouble('Say why, in a few words.');
    setBusy(true);
    const result = await act(asking.action({ minutes: Number(minutes), words: words.trim() }));
    setBusy(false);
    if (result.ok) onClose();
    else setTrouble(result.says);
  };
  return (
    <Modal open onClose={onClose} labelledBy={heading} describedBy={`${heading}-says`}>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void submit();
        }}
      >
        <h2 id={heading}>{asking.title}</h2>
        <p className="dialog__text" id={`${heading}-says`}>{asking.says}</p>
        {asking.minutes && <TextInput label={asking.minutes.label} inputMode="numeric" unit="minutes" value={minutes} onChange={(event) => setMinutes(event.target.value)} />}
        {asking.words && (
          <TextArea label={asking.words.label} {...(asking.words.help ? { help: asking.words.help } : {})} optional={asking.words.optional ?? false} rows={3} maxLength={4000} value={words} onChange={(event) => setWords(event.target.value)} />
        )}
        {trouble && <Notice kind="stop" live>{trouble}</Notice>}
        <div className="dialog__do">
          <Button size="touch" onClick={onClose} data-first={!asking.words && !asking.minutes}>Go back</Button>
          <Button size="touch" type="submit" look={asking.look === 'stop' ? 'stop-main' : 'main'} busy={busy}>{asking.verb}</Button>
        </div>
      </form>
    </Modal>
  );
}
