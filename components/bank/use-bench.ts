'use client';

import { useCallback, useEffect, useState } from 'react';
import { fetchWorkingText, type TextWire } from '@/lib/bank/client';
import type { SaveInput, TemplateState } from '@/lib/bank/model';
import type { TemplateShown } from '@/lib/bank/views';
import type { Result } from '@/lib/result';

export type Saved = { slug: string; revision: number; state: TemplateState; savedAt: Date };
export type SaveAction = (input: SaveInput) => Promise<Result<Saved>>;
/** How the text stands: stored, not yet stored, being stored, refused (`says` tells why), or overtaken by somebody else's save. */
export type Standing = { kind: 'stored' | 'changed' | 'storing' } | { kind: 'refused'; says: string } | { kind: 'overtaken'; says: string; theirs: TextWire | null };

export type Bench = {
  text: string;
  setText(text: string): void;
  state: TemplateState;
  revision: number;
  standing: Standing;
  /** Stores the text if it changed; true when what is typed is stored. */
  save(): Promise<boolean>;
  /** Ends a conflict: keeps what is typed over theirs, or takes theirs. */
  settle(keep: 'mine' | 'theirs'): void;
};

const lost = 'The server did not answer. Your text is still here: try again in a moment.';

/** Asks before the page is left with text that is not stored. */
function useLeaveGuard(unsaved: boolean) {
  useEffect(() => {
    if (!unsaved) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [unsaved]);
}

/** The working text of a template in this browser, and its way to the server. */
export function useBench(template: TemplateShown, saveDraft: SaveAction): Bench {
  const [text, setText] = useState(template.text);
  const [stored, setStored] = useState({ text: template.text, revision: template.revision, state: template.state });
  const [trouble, setTrouble] = useState<Extract<Standing, { says: string }> | null>(null);
  const [storing, setStoring] = useState(false);
  // A review decided elsewhere changes the state but not the text.
  const [seen, setSeen] = useState(template);
  if (seen !== template) {
    setSeen(template);
    if (template.revision >= stored.revision) setStored((before) => ({ ...before, state: template.state }));
  }
  const changed = text !== stored.text;
  useLeaveGuard(changed);

  const save = useCallback(async () => {
    if (text === stored.text) return true;
    setStoring(true);
    const result = await saveDraft({ id: template.id, text, revision: stored.revision }).catch(() => null);
    setStoring(false);
    if (result?.ok) {
      setStored({ text, revision: result.value.revision, state: result.value.state });
      setTrouble(null);
      if (result.value.slug !== template.slug) window.history.replaceState(null, '', `/bank/${result.value.slug}`);
      return true;
    }
    if (result?.code !== 'changed-since') setTrouble({ kind: 'refused', says: result?.says ?? lost });
    else {
      const theirs = await fetchWorkingText(template.id).catch(() => null);
      setTrouble({ kind: 'overtaken', says: result.says, theirs });
    }
    return false;
  }, [text, stored, template.id, template.slug, saveDraft]);

  const settle = useCallback((keep: 'mine' | 'theirs') => {
    if (trouble?.kind !== 'overtaken' || !trouble.theirs) return;
    setStored((before) => ({ ...before, text: trouble.theirs?.text ?? before.text, revision: trouble.theirs?.revision ?? before.revision }));
    if (keep === 'theirs') setText(trouble.theirs.text);
    setTrouble(null);
  }, [trouble]);

  const standing: Standing = storing ? { kind: 'storing' } : changed && trouble ? trouble : { kind: changed ? 'changed' : 'stored' };
  return { text, setText, state: stored.state, revision: stored.revision, standing, save, settle };
}

/** A value that follows another once it has been still for `milliseconds`. */
export function useSettled<Value>(value: Value, milliseconds: number): Value {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), milliseconds);
    return () => clearTimeout(timer);
  }, [value, milliseconds]);
  return settled;
}
