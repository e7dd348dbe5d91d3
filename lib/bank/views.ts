import type { CheckState, TemplateState, Verdict } from './model';

/** A row of the bank's ledger. Minutes are the expected working time [min]; `forms` counts the frozen forms it stands on. */
export type LedgerRow = {
  id: string;
  slug: string;
  title: string;
  area: string;
  level: number | null;
  kinds: string[];
  marks: number | null;
  minutes: number | null;
  cautions: string[];
  version: number | null;
  state: TemplateState;
  check: CheckSummary | null;
  forms: number;
  changedAt: Date;
  changedBy: string | null;
};
/** `current` says whether the check was of the text as it stands. */
export type CheckSummary = { state: CheckState; done: number; draws: number; problems: number; current: boolean };

/** A check with its report; the report is that of `lib/templates/check`, or only problems where the text did not read. */
export type CheckShown = { id: string; state: CheckState; done: number; draws: number; says: string; current: boolean; askedAt: Date; report: unknown };

/** An unchangeable version with its review; `inUse` when exams may choose it. */
export type VersionShown = {
  id: string;
  number: number;
  author: string;
  madeAt: Date;
  marks: number;
  engine: string;
  forms: number;
  askedBy: string;
  askNote: string;
  verdict: Verdict | null;
  decidedBy: string | null;
  decidedAt: Date | null;
  note: string;
  retiredAt: Date | null;
  /** The actor may approve or return it. */
  mayDecide: boolean;
};

/** All that a template's page shows. `mayTakeBack`: the actor asked for the review or wrote the text. */
export type TemplatePage = {
  id: string;
  slug: string;
  title: string;
  area: string;
  level: number | null;
  state: TemplateState;
  text: string;
  revision: number;
  changedAt: Date;
  changedBy: string | null;
  inUse: number | null;
  mayTakeBack: boolean;
  versions: VersionShown[];
  check: CheckShown | null;
};

/** A version that an exam may choose: the newest approved one of a template that is not retired. */
export type ApprovedVersion = {
  versionId: string; templateId: string; slug: string; number: number; title: string; area: string; level: number; minutes: number; marks: number; kinds: string[];
};


/** The page of a template as its browser gets it: times in words of the school's zone. */
export type TemplateShown = Omit<TemplatePage, 'changedAt' | 'versions' | 'check'> & {
  changedAt: string;
  versions: VersionLine[];
  check: Omit<CheckShown, 'askedAt'> | null;
};
export type VersionLine = Omit<VersionShown, 'madeAt' | 'decidedAt' | 'retiredAt'> & { madeAt: string; decidedAt: string | null; retiredAt: string | null };
