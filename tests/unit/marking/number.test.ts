import { describe, expect, it } from 'vitest';
import { markQuestion } from '@/lib/marking/mark';
import { markingPolicySchema } from '@/lib/marking/policy';
import { drawOf, fixedMotor, templateOf } from '../../support/templates';

const template = templateOf(fixedMotor);
const draw = drawOf(template);
const mark = (answers: Record<string, string>, policy = {}) => markQuestion(template, draw, answers, markingPolicySchema.parse(policy));
const verdicts = (answers: Record<string, string>, policy = {}) => mark(answers, policy).parts.map(({ verdict, awarded }) => [verdict, awarded]);

// Keys by hand: a 49 A (0.245 A accepted), b 210.4 V (0.5 %: 1.052 V), c 10 309.6 W (1 %).
describe('marking numbers', () => {
  it('awards full marks to the key in any unit and form that reads', () => {
    expect(verdicts({ a: '49 A', b: '0.2104 kV', c: '10.31 kW' })).toEqual([['correct', 1], ['correct', 2], ['correct', 3]]);
    expect(mark({ a: '49', b: '210.4', c: '10 310' }).awarded).toBe(6);
  });

  it('takes the larger of a relative and an absolute tolerance, up to its edge', () => {
    expect(verdicts({ a: '49.245 A' })[0]).toEqual(['correct', 1]);
    expect(verdicts({ a: '49.25 A' })[0]).toEqual(['wrong', 0]);
    expect(verdicts({ b: '211.45 V' })[1]).toEqual(['correct', 2]);
    expect(verdicts({ b: '211.46 V' })[1]).toEqual(['wrong', 0]);
  });

  it('follows a wrong value through: one slip costs its marks once', () => {
    // a 60 A wrong; b 230 - 60 x 0.4 = 206 V and c 60 x 206 = 12 360 W would be carried, but c is beyond its limits.
    const marked = mark({ a: '45 A', b: '212 V', c: '9540 W' }); // 230 - 45 x 0.4 = 212; 45 x 212 = 9540
    expect(marked.parts.map(({ verdict, awarded }) => [verdict, awarded])).toEqual([['wrong', 0], ['carried', 2], ['carried', 3]]);
    expect(marked.parts[1]?.carriedFrom).toEqual(['a']);
    expect(marked.parts[2]?.carriedFrom).toEqual(['a', 'b']);
    expect(marked.awarded).toBe(5);
  });

  it('accepts the true key after a wrong earlier part', () => {
    expect(verdicts({ a: '45 A', b: '210.4 V', c: '10310 W' })).toEqual([['wrong', 0], ['correct', 2], ['correct', 3]]);
  });

  it('calls a key from own rounding correct, not carried', () => {
    // 49.2 A and 209.5 V are within tolerance; 49.2 x 209.5 = 10 307 is near the key anyway, 49.2 x 211.4 = 10 401 is 0.89 % off it.
    expect(verdicts({ a: '49.2 A', b: '211.4 V', c: '10500 W' })[2]).toEqual(['correct', 3]); // within 1 % of 10 401, beyond 1 % of 10 309.6
  });

  it('carries nothing from a blank or unread part', () => {
    expect(verdicts({ a: '', b: '210.4 V' }).slice(0, 2)).toEqual([['blank', 0], ['correct', 2]]);
    expect(verdicts({ a: 'forty-five', b: '212 V' }).slice(0, 2)).toEqual([['unread', 0], ['wrong', 0]]); // 212 V is 0.76 % off the key
  });

  it('sends what follows from an impossible value to a person', () => {
    const marked = mark({ a: '60 A', b: '206 V', c: '12360 W' }); // 60 x 206, above the limit of 11 500 W
    expect(marked.parts.map(({ verdict }) => verdict)).toEqual(['wrong', 'carried', 'for-marker']);
    expect(marked.parts[2]).toMatchObject({ awarded: 0, flagged: true, rule: 'absurd-carried' });
  });

  it('explains a misstep and gives the marks it earns, from true and own values', () => {
    expect(mark({ a: '51 A' }).parts[0]).toMatchObject({ verdict: 'misstep', awarded: 0, says: 'What went wrong: field current added.' });
    expect(verdicts({ a: '49 A', b: '249.6 V' })[1]).toEqual(['misstep', 1]); // 230 + 49 x 0.4
    expect(verdicts({ a: '45 A', b: '248 V' })[1]).toEqual(['misstep', 1]); // 230 + 45 x 0.4
  });

  it('charges a unit mistake once a question', () => {
    expect(verdicts({ a: '49 mA', b: '210.4 kV', c: '10310 W' })).toEqual([['misstep', 0], ['misstep', 2], ['correct', 3]]);
    expect(mark({ a: '49 mA', b: '210.4 kV' }).parts.map(({ rule }) => rule).slice(0, 2)).toEqual(['prefix', 'prefix']);
    expect(verdicts({ b: '0.2104 V', c: '10.31 W' }).slice(1)).toEqual([['misstep', 1], ['carried', 3]]); // 49 x 0.2104
  });

  it('follows through a value whose prefix was put right', () => {
    expect(verdicts({ a: '45 A', b: '0.212 V', c: '9540 W' })).toEqual([['wrong', 0], ['misstep', 1], ['carried', 3]]);
  });

  it('marks another dimension wrong and says so; kVA is not kW', () => {
    expect(mark({ a: '49 V' }).parts[0]).toMatchObject({ verdict: 'wrong', rule: 'dimension' });
    expect(mark({ c: '10.31 kVA' }).parts[2]).toMatchObject({ verdict: 'wrong', rule: 'dimension' });
  });

  it('takes the unit mark where the policy says so, once', () => {
    expect(verdicts({ a: '49', b: '210.4', c: '10310' }, { unitMissing: 'lose' })).toEqual([['correct', 0], ['correct', 2], ['correct', 3]]);
    expect(verdicts({ a: '49', b: '210.4', c: '10310' })).toEqual([['correct', 1], ['correct', 2], ['correct', 3]]);
  });

  it('sends an unmatched answer with working to a marker, and only where working is asked', () => {
    expect(mark({ c: '7000 W', 'c.working': 'E x I' }).parts[2]).toMatchObject({ verdict: 'for-marker', awarded: 0, rule: 'working' });
    expect(mark({ 'c.working': 'E x I' }).parts[2]).toMatchObject({ verdict: 'for-marker', awarded: 0 });
    expect(mark({ c: '7000 W', 'c.working': '  ' }).parts[2]?.verdict).toBe('wrong');
    expect(mark({ b: '100 V', 'b.working': 'E x I' }).parts[1]?.verdict).toBe('wrong');
  });

  it('gives the share of the marks that the policy leaves to carried values', () => {
    expect(verdicts({ a: '45 A', b: '212 V' }, { carriedShare: 0.5 })[1]).toEqual(['carried', 1]);
  });

  it('reads the decimal mark of the locale', () => {
    const french = drawOf(template, 'seed', 'fr-CA');
    expect(markQuestion(template, french, { a: '49,1 A', b: '210,4', c: '10 309,6' }).awarded).toBe(6);
  });

  it('shows blank as blank, never as wrong', () => {
    expect(verdicts({})).toEqual([['blank', 0], ['blank', 0], ['blank', 0]]);
    expect(verdicts({ a: '   ' })[0]).toEqual(['blank', 0]);
  });
});
