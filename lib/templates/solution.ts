import type { Block } from './blocks';
import type { Draw } from './draw';
import { blocksHtml } from './html';
import type { Template } from './plan';
import { textBlocks } from './text-blocks';

/** The worked solution as a tree with the candidate's own numbers, for PDF. It tells the keys: for after the release only. */
export const solutionBlocks = (template: Template, draw: Draw): Block[] => textBlocks(template, draw, template.head.solution);

/** The worked solution as HTML. It tells the keys: for after the release only. */
export const solutionHtml = (template: Template, draw: Draw): string => blocksHtml(solutionBlocks(template, draw));
