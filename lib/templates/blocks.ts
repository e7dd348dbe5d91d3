import type { PhrasingContent, Root, RootContent } from 'mdast';
import { fromMarkdown } from 'mdast-util-from-markdown';
import { gfmTableFromMarkdown } from 'mdast-util-gfm-table';
import { mathFromMarkdown } from 'mdast-util-math';
import { gfmTable } from 'micromark-extension-gfm-table';
import { math } from 'micromark-extension-math';
import { cutAtPlaceholders, replacePlaceholders } from './placeholders';
import type { Printed } from './print';

/** A piece of a line: text, or a formula in TeX. `drawn` marks a value of this draw. */
export type Run =
  | { type: 'text'; text: string; drawn?: true; strong?: true; emphasis?: true }
  | { type: 'formula'; tex: string; display: boolean }
  | { type: 'break' };
/** The small Markdown of stems and solutions as a tree, for HTML, PDF and plain text alike. */
export type Block =
  | { type: 'paragraph'; runs: Run[] }
  | { type: 'list'; ordered: boolean; items: Block[][] }
  | { type: 'table'; head: Run[][]; rows: Run[][][] };

/** What a placeholder prints; null where nothing has that name. */
export type PrintName = (name: string) => Printed | null;

interface Reading { source: string; print: PrintName; strong?: true; emphasis?: true }

/** Reads Markdown once; the tree does not depend on a draw. Links, images, HTML and code have no meaning here. */
export const readMarkdown = (text: string): Root =>
  fromMarkdown(text, { extensions: [math(), gfmTable(), { disable: { null: ['htmlFlow', 'htmlText', 'definition', 'labelStartLink', 'labelStartImage', 'autolink', 'codeIndented', 'codeFenced', 'codeText', 'headingAtx', 'setextUnderline', 'blockQuote', 'thematicBreak'] } }], mdastExtensions: [mathFromMarkdown(), gfmTableFromMarkdown()] });

const textRuns = (text: string, { print, strong, emphasis }: Reading): Run[] => {
  const style = { ...(strong ? { strong } : {}), ...(emphasis ? { emphasis } : {}) };
  return cutAtPlaceholders(text.replace(/\n/g, ' ')).map((piece): Run => {
    if ('text' in piece) return { type: 'text', text: piece.text, ...style };
    const printed = print(piece.name);
    return printed === null ? { type: 'text', text: `{{${piece.name}}}`, ...style } : { type: 'text', text: printed.text, drawn: true, ...style };
  });
};

const formulaRun = (tex: string, display: boolean, { print }: Reading): Run => ({
  type: 'formula', display, tex: replacePlaceholders(tex, (name) => print(name)?.tex ?? `\\text{${name}}`),
});

const runsOf = (nodes: readonly PhrasingContent[], reading: Reading): Run[] =>
  nodes.flatMap((node): Run[] => {
    switch (node.type) {
      case 'text':
        return textRuns(node.value, reading);
      case 'strong':
        return runsOf(node.children, { ...reading, strong: true });
      case 'emphasis':
        return runsOf(node.children, { ...reading, emphasis: true });
      case 'inlineMath':
        // Two dollars on one line are a formula of its own line too.
        return [formulaRun(node.value, reading.source.startsWith('$$', node.position?.start.offset), reading)];
      case 'break':
        return [{ type: 'break' }];
      default:
        return [];
    }
  });

const blockOf = (node: RootContent, reading: Reading): Block[] => {
  switch (node.type) {
    case 'paragraph':
      return [{ type: 'paragraph', runs: runsOf(node.children, reading) }];
    case 'math':
      return [{ type: 'paragraph', runs: [formulaRun(node.value, true, reading)] }];
    case 'list':
      return [{ type: 'list', ordered: node.ordered === true, items: node.children.map((item) => item.children.flatMap((child) => blockOf(child, reading))) }];
    case 'table': {
      const [head, ...rows] = node.children.map((row) => row.children.map((cell) => runsOf(cell.children, reading)));
      return [{ type: 'table', head: head ?? [], rows }];
    }
    default:
      return [];
  }
};

/** Markdown as a tree, with this draw's values in place. */
export const blocksOf = (text: string, print: PrintName, tree: Root = readMarkdown(text)): Block[] =>
  tree.children.flatMap((node) => blockOf(node, { source: text, print }));

/** All formulas of a tree. */
export const formulasIn = (blocks: readonly Block[]): { tex: string; display: boolean }[] => {
  const inRuns = (runs: readonly Run[]) => runs.flatMap((run) => (run.type === 'formula' ? [run] : []));
  return blocks.flatMap((block) => {
    if (block.type === 'paragraph') return inRuns(block.runs);
    if (block.type === 'list') return block.items.flatMap(formulasIn);
    return [block.head, ...block.rows].flatMap((row) => row.flatMap(inRuns));
  });
};
