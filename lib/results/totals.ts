import type { PassRule } from '@/lib/exams/model';
import type { AppliedRule, AreaShare, Breakdown, SectionShare, Share, Totals } from './model';

/** Hundredths as whole numbers, in which marks add up exactly. */
const hundredths = (marks: number): number => Math.round(marks * 100);

/**
 * Share of marks [%], rounded as the pass rule says, halves upward. Where nothing is rounded two decimals are kept and the
 * rest cut off, so that no figure ever looks like a pass that it is not.
 */
export function percentOf(awarded: number, of: number, rounding: PassRule['rounding']): number {
  const had = hundredths(awarded);
  const whole = hundredths(of);
  if (whole === 0) return 0;
  if (rounding === 'whole') return Math.floor((had * 100) / whole + 0.5);
  if (rounding === 'tenth') return Math.floor((had * 1_000) / whole + 0.5) / 10;
  return Math.floor((had * 10_000) / whole) / 100;
}

/** Whether a share reaches what is wanted [%] after the rounding of the pass rule. */
export function reaches(share: Pick<Share, 'awarded' | 'of'>, wanted: number, rounding: PassRule['rounding']): boolean {
  if (rounding !== 'none') return percentOf(share.awarded, share.of, rounding) >= wanted;
  // Compared as products, so that a quotient such as 2/3 rounds nothing away; the margin is a millionth of a hundredth mark.
  return hundredths(share.awarded) * 100 - wanted * hundredths(share.of) >= -1e-6;
}

/** Marks of one question with its place. */
export type QuestionMarks = { section: number; area: string; areaTitle: string; awarded: number; of: number };
export type SectionRule = { title: string; leastPercent: number | null };
export type Marked = { sections: readonly SectionRule[]; rule: PassRule; questions: readonly QuestionMarks[]; sat: boolean; forMarker: boolean };

const sum = (questions: readonly QuestionMarks[], rounding: PassRule['rounding']): Share => {
  const awarded = questions.reduce((total, question) => total + hundredths(question.awarded), 0) / 100;
  const of = questions.reduce((total, question) => total + hundredths(question.of), 0) / 100;
  return { awarded, of, percent: percentOf(awarded, of, rounding) };
};

const areasOf = (questions: readonly QuestionMarks[], rounding: PassRule['rounding']): AreaShare[] =>
  [...new Set(questions.map((question) => question.area))].map((area) => {
    const inside = questions.filter((question) => question.area === area);
    return { area, title: inside[0]?.areaTitle ?? area, ...sum(inside, rounding) };
  });

/** Sections by their place in the exam, from 1; one without questions is left out. */
function sectionsOf({ sections, questions, rule }: Marked): (SectionShare & { leastPercent: number | null })[] {
  return sections.flatMap((section, index) => {
    const inside = questions.filter((question) => question.section === index + 1);
    if (inside.length === 0) return [];
    const title = section.title || `Section ${index + 1}`;
    return [{ title, ...sum(inside, rule.rounding), areas: areasOf(inside, rule.rounding), leastPercent: section.leastPercent }];
  });
}

/** Total, breakdown by section and area, and each condition of the pass rule with what was wanted and what was had. */
export function totalsOf(marked: Marked): Totals {
  const { rule, questions } = marked;
  const whole = sum(questions, rule.rounding);
  const sections = sectionsOf(marked);
  const rules: AppliedRule[] = [
    { says: 'All marks', wanted: rule.overallPercent, had: whole.percent, met: reaches(whole, rule.overallPercent, rule.rounding) },
    ...sections.flatMap(({ title, leastPercent, ...share }) =>
      leastPercent === null || leastPercent <= 0 ? [] : [{ says: title, wanted: leastPercent, had: share.percent, met: reaches(share, leastPercent, rule.rounding) }]),
  ];
  const decided = rules.every(({ met }) => met) ? 'pass' : 'not passed';
  const breakdown: Breakdown = { sections: sections.map(({ leastPercent: _, ...section }) => section), areas: areasOf(questions, rule.rounding) };
  const outcome = !marked.sat ? 'absent' : marked.forMarker ? 'second marker' : decided;
  return { total: whole.awarded, of: whole.of, percent: whole.percent, outcome, breakdown, rule: { rounding: rule.rounding, rules } };
}
