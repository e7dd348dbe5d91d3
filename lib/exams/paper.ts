import type { Question } from '@/lib/templates/question';

/** A section of a paper; `first` and `last` are question numbers counted from 1. */
export type PaperSection = { title: string; instructionsHtml: string; first: number; last: number; marks: number };

/** What a candidate may see of their paper: plain JSON, stored whole. No slug, seed, key, formula or misstep. */
export type PaperContent = {
  title: string;
  cover: { instructionsHtml: string; declaration: string };
  /** Time allowed by the form, without accommodations [min]. */
  minutes: number;
  marks: number;
  /** What may lie on the bench, a line each. */
  materials: string[];
  /** The pass rule in words. */
  passRule: string[];
  /** The formula sheet, where the exam allows one. */
  formulaSheetHtml: string | null;
  sections: PaperSection[];
  /** Question n stands at index n - 1. */
  questions: Question[];
};
