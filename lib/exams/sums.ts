import type { ExamContent, ExamSection, VersionFacts } from './model';

export type Sum = { questions: number; parts: number; marks: number; minutes: number };
export type Coverage = { area: string; level: number; wanted: number | null; marks: number };
export type ExamSums = Sum & { sections: Sum[]; coverage: Coverage[] };

const nothing: Sum = { questions: 0, parts: 0, marks: 0, minutes: 0 };
const add = (a: Sum, b: Sum): Sum => ({
  questions: a.questions + b.questions,
  parts: a.parts + b.parts,
  marks: a.marks + b.marks,
  minutes: Math.round((a.minutes + b.minutes) * 10) / 10,
});

type Facts = ReadonlyMap<string, VersionFacts>;

function sectionSum(section: Pick<ExamSection, 'items'>, versions: Facts): Sum {
  return section.items.reduce((sum, item) => {
    const version = versions.get(item.versionId);
    return version ? add(sum, { questions: 1, parts: version.parts, marks: version.marks, minutes: version.minutes }) : sum;
  }, nothing);
}

/** Marks of an exam per area and level, beside what its blueprint wants; rows wanted but empty stand too. */
export function coverageOf(content: Pick<ExamContent, 'sections' | 'blueprint'>, versions: Facts): Coverage[] {
  const rows = new Map<string, Coverage>();
  const row = (area: string, level: number): Coverage => {
    const key = `${area} ${level}`;
    const found = rows.get(key) ?? { area, level, wanted: null, marks: 0 };
    rows.set(key, found);
    return found;
  };
  for (const { area, level, marks } of content.blueprint) {
    const wanted = row(area, level);
    wanted.wanted = (wanted.wanted ?? 0) + marks;
  }
  for (const item of content.sections.flatMap((section) => section.items)) {
    const version = versions.get(item.versionId);
    if (version) row(version.area, version.level).marks += version.marks;
  }
  return [...rows.values()].sort((a, b) => a.area.localeCompare(b.area) || a.level - b.level);
}

/** Questions, parts, marks and expected minutes of an exam, by section and in all. Versions not among the facts count nothing. */
export function sumsOf(content: Pick<ExamContent, 'sections' | 'blueprint'>, versions: Facts): ExamSums {
  const sections = content.sections.map((section) => sectionSum(section, versions));
  return { ...sections.reduce(add, nothing), sections, coverage: coverageOf(content, versions) };
}

/** What stops a review (`stops`) or only wants a look; in the order of the sheet. */
export type ExamProblem = { code: string; stops: boolean; says: string };

const one = (count: number, word: string): string => `${count} ${word}${count === 1 ? '' : 's'}`;

function itemProblems(content: Pick<ExamContent, 'sections'>, versions: Facts): ExamProblem[] {
  const problems: ExamProblem[] = [];
  const seen = new Set<string>();
  content.sections.forEach((section, index) => {
    const name = section.title || `Section ${index + 1}`;
    if (section.items.length === 0) problems.push({ code: 'empty-section', stops: true, says: `${name} has no question: add one or take the section out.` });
    for (const item of section.items) {
      const version = versions.get(item.versionId);
      if (!version) problems.push({ code: 'unknown-version', stops: true, says: `${name} holds a template that is no longer in the bank: take it out.` });
      else if (!version.usable) problems.push({ code: 'not-approved', stops: true, says: `“${version.title}”, version ${version.number}, is not approved: take another version or template.` });
      else if (version.newer) problems.push({ code: 'older-version', stops: false, says: `“${version.title}” has a newer approved version ${version.newer.number}.` });
      if (seen.has(item.templateId)) problems.push({ code: 'twice', stops: true, says: `“${version?.title ?? 'A template'}” stands on the exam twice: take one out.` });
      seen.add(item.templateId);
    }
  });
  return problems;
}

/** Reads an exam through: what must be put right before a review, and what only wants a look. `areas` are titles by name. */
export function examProblems(content: ExamContent, versions: Facts, areas: Readonly<Record<string, string>> = {}): ExamProblem[] {
  const sums = sumsOf(content, versions);
  const problems: ExamProblem[] = [];
  if (content.sections.length === 0) problems.push({ code: 'no-section', stops: true, says: 'There is no section yet: add one and choose its questions.' });
  problems.push(...itemProblems(content, versions));
  if (content.minutes === 0) problems.push({ code: 'no-time', stops: true, says: 'The time allowed is not set.' });
  else if (sums.minutes > content.minutes) {
    problems.push({ code: 'short-time', stops: false, says: `The questions are expected to take ${sums.minutes} minutes; ${one(content.minutes, 'minute')} are allowed.` });
  }
  if (content.cover.declaration.trim() === '') problems.push({ code: 'no-declaration', stops: false, says: 'The cover page asks for no declaration.' });
  if (content.materials.formulaSheet && content.formulaSheet.trim() === '') {
    problems.push({ code: 'no-formula-sheet', stops: true, says: 'A formula sheet is allowed, but it is empty: write it or disallow it.' });
  }
  for (const row of sums.coverage) {
    if (row.wanted !== null && row.wanted !== row.marks) {
      problems.push({ code: 'blueprint', stops: false, says: `${areas[row.area] ?? row.area}, level ${row.level}: the blueprint wants ${one(row.wanted, 'mark')}, the exam has ${row.marks}.` });
    }
  }
  return problems;
}

/** The pass rule in words, as the cover page and results print it. */
export function passRuleSays(content: Pick<ExamContent, 'passRule' | 'sections'>): string[] {
  const lines = [`At least ${content.passRule.overallPercent} % of all marks.`];
  content.sections.forEach((section, index) => {
    if (section.leastPercent !== null && section.leastPercent > 0) {
      lines.push(`At least ${section.leastPercent} % of the marks of ${section.title || `section ${index + 1}`}.`);
    }
  });
  return lines;
}

const calculatorSays = { none: 'No calculator', 'non-programmable': 'Non-programmable calculator', any: 'Any calculator' } as const;

/** What may lie on the bench, a line each. */
export function materialsSay(materials: ExamContent['materials']): string[] {
  const other = materials.other.split('\n').map((line) => line.trim()).filter(Boolean);
  return [calculatorSays[materials.calculator], ...(materials.formulaSheet ? ['Formula sheet, given'] : []), ...(materials.codeBook ? ['Electrical code book'] : []), ...other];
}
