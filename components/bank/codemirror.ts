import { defaultKeymap, history, historyKeymap, indentLess, indentMore } from '@codemirror/commands';
import { yaml } from '@codemirror/lang-yaml';
import { bracketMatching, HighlightStyle, indentUnit, syntaxHighlighting } from '@codemirror/language';
import { type Diagnostic, lintGutter, setDiagnostics } from '@codemirror/lint';
import { EditorState, type Text } from '@codemirror/state';
import { drawSelection, EditorView, highlightActiveLine, keymap, lineNumbers } from '@codemirror/view';
import { tags } from '@lezer/highlight';
import type { Problem } from '@/lib/templates/problem';

const look = EditorView.theme({
  '&': { backgroundColor: 'var(--sheet)', color: 'var(--ink)', fontSize: 'var(--t13)', height: '100%' },
  '&.cm-focused': { outline: '2px solid var(--slate)', outlineOffset: '-2px' },
  '.cm-scroller': { fontFamily: 'var(--mono)', lineHeight: '1.54', overflow: 'auto' },
  '.cm-content': { padding: '12px 0', caretColor: 'var(--ink)' },
  '.cm-gutters': { backgroundColor: 'var(--sheet)', color: 'var(--ink-soft)', border: 'none' },
  '.cm-activeLine': { backgroundColor: 'var(--well)' },
  '&.cm-focused > .cm-scroller > .cm-selectionLayer .cm-selectionBackground, .cm-selectionBackground': { backgroundColor: 'var(--slate-wash)' },
  '.cm-cursor': { borderLeftColor: 'var(--ink)' },
  '.cm-matchingBracket, &.cm-focused .cm-matchingBracket': { backgroundColor: 'var(--slate-wash)', outline: '1px solid var(--slate)' },
  '.cm-lintRange-error': { backgroundImage: 'none', textDecoration: 'underline wavy var(--glyptal)' },
  '.cm-tooltip': { backgroundColor: 'var(--sheet)', color: 'var(--ink)', border: '1px solid var(--rule-strong)', fontFamily: 'var(--sans)', fontSize: 'var(--t13)' },
  '.cm-diagnostic-error': { borderLeftColor: 'var(--glyptal)' },
});

const colours = HighlightStyle.define([
  { tag: [tags.propertyName, tags.definition(tags.propertyName)], color: 'var(--slate)' },
  { tag: tags.comment, color: 'var(--ink-soft)', fontStyle: 'italic' },
  { tag: [tags.string, tags.special(tags.string), tags.content], color: 'var(--ink)' },
  { tag: [tags.number, tags.bool], color: 'var(--enamel)' },
  { tag: [tags.separator, tags.punctuation, tags.squareBracket, tags.brace], color: 'var(--ink-soft)' },
]);

// Tab is left alone: it moves on to the next control, so that nobody is caught in the editor.
const indenting = keymap.of([{ key: 'Mod-]', run: indentMore }, { key: 'Mod-[', run: indentLess }]);

/** The nonce of the first page load; one passed later would be stale after a soft navigation. */
const nonce = (): string => document.querySelector<HTMLMetaElement>('meta[property="csp-nonce"]')?.content ?? '';

export type EditorOptions = { text: string; label: string; readOnly: boolean; describedBy: string; onChange: (text: string) => void; onSave: () => void };

/** An editor of YAML in `parent`. The caller destroys it. */
export function openEditor(parent: HTMLElement, options: EditorOptions): EditorView {
  const saving = keymap.of([{ key: 'Mod-s', preventDefault: true, run: () => (options.onSave(), true) }]);
  const extensions = [
    EditorView.cspNonce.of(nonce()),
    EditorView.contentAttributes.of({ tabindex: '0', 'aria-label': options.label, 'aria-describedby': options.describedBy }),
    EditorState.readOnly.of(options.readOnly),
    EditorView.editable.of(!options.readOnly),
    EditorView.updateListener.of((update) => update.docChanged && options.onChange(update.state.doc.toString())),
    lineNumbers(), history(), drawSelection(), highlightActiveLine(), bracketMatching(), lintGutter(), indentUnit.of('  '),
    yaml(), syntaxHighlighting(colours), look, saving, indenting, keymap.of([...defaultKeymap, ...historyKeymap]),
  ];
  return new EditorView({ parent, state: EditorState.create({ doc: options.text, extensions }) });
}

function placeOf(doc: Text, problem: Problem): { from: number; to: number } {
  const line = doc.line(Math.min(Math.max(problem.line ?? 1, 1), doc.lines));
  const from = Math.min(line.from + Math.max((problem.column ?? 1) - 1, 0), line.to);
  return { from, to: line.to };
}

/** Shows problems in the gutter and under the text they concern. */
export function showProblems(view: EditorView, problems: readonly Problem[]): void {
  const placed = problems.filter((problem) => problem.line !== undefined);
  const diagnostics = placed.map((problem): Diagnostic => ({ ...placeOf(view.state.doc, problem), severity: 'error', message: problem.says }));
  view.dispatch(setDiagnostics(view.state, diagnostics));
}

/** Puts the cursor where a problem is and shows the place. */
export function goTo(view: EditorView, problem: Problem): void {
  const { from } = placeOf(view.state.doc, problem);
  view.dispatch({ selection: { anchor: from }, effects: EditorView.scrollIntoView(from, { y: 'center' }) });
  view.focus();
}

/** Replaces the whole text, as one step that can be undone. */
export function replaceText(view: EditorView, text: string): void {
  if (view.state.doc.toString() !== text) view.dispatch({ changes: { from: 0, to: view.state.doc.length, insert: text } });
}
