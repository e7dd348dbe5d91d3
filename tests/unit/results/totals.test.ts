import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { resultStates } from '@/lib/results/model';
import { isOpenToStudent, nextResult, type ResultEvent } from '@/lib/results/rules';
import { percentOf, reaches, totalsOf } from '@/lib/results/totals';

const question = (section: number, area: string, awarded: number, of: number) => ({ section, area, areaTitle: area, awarded, of });
const exam = { sections: [{ title: 'Motors', leastPercent: 50 }, { title: '', leastPercent: null }], sat: true, forMarker: false };

describe('rounding of a share', () => {
  // The sentences printed with each rule, at their own edges.
  it.each([
    [69.95, 'tenth', 70, true], [69.94, 'tenth', 69.9, false], [69.5, 'whole', 70, true], [69.49, 'whole', 69, false], [69.99, 'none', 69.99, false], [70, 'none', 70, true],
  ] as const)('%d of 100, %s: %d, pass %s', (awarded, rounding, percent, pass) => {
    expect(percentOf(awarded, 100, rounding)).toBe(percent);
    expect(reaches({ awarded, of: 100 }, 70, rounding)).toBe(pass);
  });

  it('never shows a share that reaches the mark where the decision says it does not', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 400 }), fc.double({ min: 0, max: 1, noNaN: true }), fc.integer({ min: 0, max: 100 }), fc.constantFrom('none' as const, 'tenth' as const, 'whole' as const), (of, share, wanted, rounding) => {
      const awarded = Math.round(of * share * 4) / 4;
      expect(percentOf(awarded, of, rounding) >= wanted).toBe(reaches({ awarded, of }, wanted, rounding));
    }));
  });
});

describe('totals', () => {
  it('adds sections and areas up to the whole and asks each condition', () => {
    const questions = [question(1, 'dc-motors', 1.25, 4), question(1, 'dc-generators', 0.5, 2), question(2, 'dc-generators', 14, 14)];
    const totals = totalsOf({ ...exam, questions, rule: { overallPercent: 70, rounding: 'none' } });
    // 15.75 of 20 is 78.75 %; 1.75 of 6 is 29.166… %, below the section's half.
    expect(totals).toMatchObject({ total: 15.75, of: 20, percent: 78.75, outcome: 'not passed' });
    expect(totals.rule.rules.map(({ wanted, had, met }) => [wanted, had, met])).toEqual([[70, 78.75, true], [50, 29.16, false]]);
    expect(totals.breakdown.areas.map(({ area, awarded, of }) => [area, awarded, of])).toEqual([['dc-motors', 1.25, 4], ['dc-generators', 14.5, 16]]);
    expect(totals.breakdown.sections[1]).toMatchObject({ title: 'Section 2', percent: 100 });
  });

  it('is open while a part waits for a marker, and absent before that', () => {
    const rule = { overallPercent: 70, rounding: 'tenth' as const };
    expect(totalsOf({ ...exam, rule, questions: [question(1, 'dc-motors', 4, 4)], forMarker: true }).outcome).toBe('second marker');
    expect(totalsOf({ ...exam, rule, questions: [question(1, 'dc-motors', 0, 4)], sat: false }).outcome).toBe('absent');
  });
});

describe('states of a result', () => {
  const events: ResultEvent[] = ['mark', 'override', 'moderate', 'release', 'seal', 'withhold', 'lift'];

  it('goes forward only, never leaves its states, and never opens while withheld', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom(...events), { maxLength: 40 }), (happened) => {
      let facts = { state: 'provisional' as (typeof resultStates)[number], withheld: false };
      for (const event of happened) {
        const next = nextResult(facts, event);
        if (!next.ok) continue;
        expect(resultStates).toContain(next.value.state);
        // Once open to a student it stays open; a sealed result changes no more.
        if (isOpenToStudent(facts)) expect(isOpenToStudent(next.value)).toBe(true);
        expect(facts.state).not.toBe('sealed');
        if (next.value.withheld) expect(isOpenToStudent(next.value)).toBe(false);
        facts = next.value;
      }
    }));
  });
});
