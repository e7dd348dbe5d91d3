import type { CheckReport } from '@/lib/templates/check';
import type { Problem } from '@/lib/templates/problem';
import type { Question } from '@/lib/templates/question';
import type { TemplateFacts } from './model';

/** What the sandbox can be asked to do with a text. */
export type Task =
  | { kind: 'read'; text: string }
  | { kind: 'preview'; text: string; seed: string; locale: string }
  | { kind: 'check'; text: string; draws: number };

/** SHA-256 [hex] of the text and of each area, caution and table it rests on, and the version of the engine. */
export type Digests = Record<string, string> & { text: string; engine: string };
/** What a text says of itself when it parses, or what is wrong with it; `digest` binds all of `digests`. */
export type Reading = { facts: TemplateFacts | null; problems: Problem[]; digests: Digests; digest: string };

export type MisstepShown = { says: string; value: string; earns: number; separatedBy?: string };
export type PartShown = {
  part: string;
  kind: string;
  marks: number;
  /** The key as printed, with its unit. */
  key: string;
  /** "± 0.30", or empty where a part has no tolerance. */
  accepts: string;
  options: { option: string; right: boolean; says: string }[];
  missteps: MisstepShown[];
};
/** One draw as an instructor sees it: the candidate's question, and beside it what a candidate never gets. */
export type DrawShown = { seed: string; redraws: number; question: Question; parts: PartShown[]; solutionHtml: string };
/** `refused` says why a text that parses gives no draw. */
export type Preview = Reading & { draw: DrawShown | null; refused: string };

/** In what share of the draws (0 to 1) the tolerance accepts a misstep; `separatedBy` names the part that marks that step by itself. */
export type MisstepShare = { part: string; says: string; share: number; separatedBy?: string };
export type ExampleShown = { source: string; obtained: string; figures: string; reproduced: boolean };
/** What a check found, as stored: the report of the language, and what the screen shows beside it. `units` by part. */
export type StoredReport = CheckReport & { missteps: MisstepShare[]; examples: ExampleShown[]; units: Record<string, string> };
/** Stored in place of a report where the text does not read. */
export type UnreadReport = { ok: false; problems: Problem[] };

export type Answers = { read: Reading; preview: Preview; check: Reading & { report: StoredReport | null } };
