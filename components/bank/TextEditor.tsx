'use client';

import type { EditorView } from '@codemirror/view';
import { useEffect, useImperativeHandle, useRef, useState, type Ref } from 'react';
import type { Problem } from '@/lib/templates/problem';

export type EditorHandle = { goTo(problem: Problem): void };
type TextEditorProps = { text: string; problems: readonly Problem[]; readOnly: boolean; onChange: (text: string) => void; onSave: () => void; ref?: Ref<EditorHandle> };
type Tools = typeof import('./codemirror');

/**
 * The text of a template: a plain text area until the editor is loaded, and the field `text` of its form always.
 * Problems stand in the gutter and under the text. Tab leaves the editor.
 */
export function TextEditor({ text, problems, readOnly, onChange, onSave, ref }: TextEditorProps) {
  const place = useRef<HTMLDivElement>(null);
  const editor = useRef<{ view: EditorView; tools: Tools } | null>(null);
  const latest = useRef({ text, onChange, onSave });
  const [ready, setReady] = useState(false);
  useEffect(() => {
    latest.current = { text, onChange, onSave };
  });
  useEffect(() => {
    let left = false;
    void import('./codemirror').then((tools) => {
      if (left || !place.current) return;
      const view = tools.openEditor(place.current, {
        text: latest.current.text, label: 'Text of the template', readOnly, describedBy: 'editor-help',
        onChange: (changed) => latest.current.onChange(changed), onSave: () => latest.current.onSave(),
      });
      editor.current = { view, tools };
      setReady(true);
    });
    return () => {
      left = true;
      editor.current?.view.destroy();
      editor.current = null;
    };
  }, [readOnly]);
  useEffect(() => {
    if (editor.current) editor.current.tools.replaceText(editor.current.view, text);
  }, [text, ready]);
  useEffect(() => {
    if (editor.current) editor.current.tools.showProblems(editor.current.view, problems);
  }, [problems, ready]);
  useImperativeHandle(ref, () => ({ goTo: (problem) => editor.current && editor.current.tools.goTo(editor.current.view, problem) }), []);
  return (
    <div className="flex min-h-0 flex-1 flex-col">
      <div ref={place} className={ready ? 'h-[28rem] min-h-0 xl:h-auto xl:flex-1' : 'hidden'} />
      <textarea
        name="text" aria-label="Text of the template" aria-describedby="editor-help" spellCheck={false} value={text} readOnly={readOnly} hidden={ready}
        onChange={(event) => onChange(event.target.value)} className="min-h-96 w-full flex-1 resize-y bg-sheet p-3 font-mono text-13"
      />
      <p id="editor-help" className="help border-t border-rule px-4 py-2">
        Tab leaves the editor. Ctrl+] and Ctrl+[ move a line in and out, Ctrl+S saves.
      </p>
    </div>
  );
}
