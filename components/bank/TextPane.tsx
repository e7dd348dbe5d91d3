'use client';

import { useRef } from 'react';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import type { Problem } from '@/lib/templates/problem';
import { type EditorHandle, TextEditor } from './TextEditor';
import type { Bench } from './use-bench';

function Trouble({ bench }: { bench: Bench }) {
  const { standing } = bench;
  if (standing.kind === 'refused') return <Notice kind="stop" live title="Not stored.">{standing.says}</Notice>;
  if (standing.kind !== 'overtaken') return null;
  const { theirs } = standing;
  return (
    <Notice kind="stop" live title="Not stored.">
      <p>{standing.says}</p>
      {theirs && (
        <>
          <details className="mt-2">
            <summary>Show the text stored by {theirs.changedBy ?? 'somebody else'}</summary>
            <pre className="mt-2 max-h-72 overflow-auto bg-sheet p-2 font-mono text-13" tabIndex={0} aria-label="The text stored meanwhile">{theirs.text}</pre>
          </details>
          <div className="btn-row mt-2">
            <Button size="dense" onClick={() => bench.settle('mine')}>Keep mine, to save over theirs</Button>
            <Button size="dense" onClick={() => bench.settle('theirs')}>Take theirs</Button>
          </div>
        </>
      )}
    </Notice>
  );
}

/** The editor with what is wrong in the text: in the gutter, and as a list beneath it that leads to each place. */
export function TextPane({ bench, problems, readOnly }: { bench: Bench; problems: readonly Problem[]; readOnly: boolean }) {
  const editor = useRef<EditorHandle>(null);
  return (
    <div className="flex min-h-0 flex-1 flex-col">
      <TextEditor ref={editor} text={bench.text} problems={problems} readOnly={readOnly} onChange={bench.setText} onSave={() => void bench.save()} />
      <div className="grid max-h-80 gap-2 overflow-auto px-4 pb-4 empty:hidden">
        <Trouble bench={bench} />
        {problems.length > 0 && (
          <ul aria-label="Problems of the text" className="grid gap-1">
            {problems.map((problem, place) => (
              <li key={place} className="grid grid-cols-[auto_1fr] items-baseline gap-2 text-13">
                <Button size="dense" look="quiet" onClick={() => editor.current?.goTo(problem)}>{problem.line ? `Line ${problem.line}` : 'Text'}</Button>
                <span>{problem.says}</span>
              </li>
            ))}
          </ul>
        )}
      </div>
    </div>
  );
}
