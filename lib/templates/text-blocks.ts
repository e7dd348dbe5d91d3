import type { Root } from 'mdast';
import { type Block, blocksOf, type PrintName, readMarkdown } from './blocks';
import type { Draw } from './draw';
import type { Template } from './plan';
import { printNamed } from './print';

const trees = new WeakMap<Template, Map<string, Root>>();
/** A template's text is parsed once, whatever the number of its draws. */
const treeOf = (template: Template, text: string): Root => {
  const known = trees.get(template) ?? new Map<string, Root>();
  trees.set(template, known);
  const tree = known.get(text) ?? readMarkdown(text);
  known.set(text, tree);
  return tree;
};

const printer = (template: Template, draw: Draw): PrintName => (name) => printNamed(template, draw, name);

/** A text of the template with this draw's values in place, as a tree: for PDF and plain text. */
export const textBlocks = (template: Template, draw: Draw, text: string): Block[] => blocksOf(text, printer(template, draw), treeOf(template, text));
