import katex from 'katex';
import type { Block, Run } from './blocks';

const escapes: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
export const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (sign) => escapes[sign] ?? sign);

const limits = { output: 'htmlAndMathml', trust: false, strict: 'ignore', maxExpand: 200, maxSize: 20 } as const;

/** A formula as HTML with MathML beside it; one that cannot be set shows its source. */
export const formulaHtml = (tex: string, display: boolean): string => {
  try {
    return katex.renderToString(tex, { ...limits, displayMode: display, throwOnError: true });
  } catch {
    return `<code>${escapeHtml(tex)}</code>`;
  }
};

/** Why a formula cannot be set; null where it can. */
export function formulaTrouble(tex: string): string | null {
  try {
    katex.renderToString(tex, { ...limits, output: 'mathml', throwOnError: true });
    return null;
  } catch (error) {
    return error instanceof Error ? error.message.replace(/^KaTeX parse error: /, '') : String(error);
  }
}

const runHtml = (run: Run): string => {
  if (run.type === 'break') return '<br>';
  if (run.type === 'formula') return formulaHtml(run.tex, run.display);
  let html = escapeHtml(run.text);
  if (run.drawn) html = `<span class="drawn">${html}</span>`;
  if (run.emphasis) html = `<em>${html}</em>`;
  return run.strong ? `<strong>${html}</strong>` : html;
};
const runsHtml = (runs: readonly Run[]): string => runs.map(runHtml).join('');

const tableHtml = ({ head, rows }: Extract<Block, { type: 'table' }>): string => {
  const cells = (row: readonly Run[][], tag: string, scope = '') => row.map((cell) => `<${tag}${scope}>${runsHtml(cell)}</${tag}>`).join('');
  return `<table><thead><tr>${cells(head, 'th', ' scope="col"')}</tr></thead><tbody>${rows.map((row) => `<tr>${cells(row, 'td')}</tr>`).join('')}</tbody></table>`;
};

/** The tree as safe HTML: every text is escaped, and no element or attribute comes from the template. */
export const blocksHtml = (blocks: readonly Block[]): string =>
  blocks.map((block) => {
    if (block.type === 'paragraph') return `<p>${runsHtml(block.runs)}</p>`;
    if (block.type === 'table') return tableHtml(block);
    const tag = block.ordered ? 'ol' : 'ul';
    return `<${tag}>${block.items.map((item) => `<li>${itemHtml(item)}</li>`).join('')}</${tag}>`;
  }).join('');

/** A list item of one paragraph needs no paragraph of its own. */
const itemHtml = (item: readonly Block[]): string => {
  const [only] = item;
  return item.length === 1 && only?.type === 'paragraph' ? runsHtml(only.runs) : blocksHtml(item);
};

/** Text of one line, without a paragraph round it. */
export const inlineHtml = itemHtml;
