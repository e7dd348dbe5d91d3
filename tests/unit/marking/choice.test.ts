import { describe, expect, it } from 'vitest';
import { markQuestion } from '@/lib/marking/mark';
import { markingPolicySchema } from '@/lib/marking/policy';
import { drawOf, fixedMotor, templateOf } from '../../support/templates';

const withChoices = fixedMotor.slice(0, fixedMotor.indexOf('  - part: c')) + `  - part: c
    kind: choice
    ask: Which power is made?
    options: computed
    key: part.a * part.b
    unit: W
    marks: 2
    missteps:
      - { key: V * IL, says: the power taken from the line }
      - { key: V * part.a, says: supply voltage in place of back-EMF, earns: 0.5 }
      - { key: 45 * 212, says: a power that fits an armature current of 45 A }
  - part: d
    kind: choice
    ask: Is the armature current above 48 A?
    marks: 1
    options:
      - { text: "Yes, on {{V}}.", right: part.a > 48 }
      - { text: "No, on {{V}}.", right: part.a <= 48 }
      - { text: It cannot be known., right: false, says: everything needed is on the plate }
solution: "{{part.a}} and {{part.c}} make {{part.d}}"
`;
const template = templateOf(withChoices);
const draw = drawOf(template);
const letter = (part: string, text: string) => draw.parts.find((drawn) => drawn.part === part)?.options?.find((option) => option.text.includes(text))?.option ?? '?';
const mark = (answers: Record<string, string>, policy = {}) => markQuestion(template, draw, answers, markingPolicySchema.parse(policy)).parts;

// By hand: c 49 x 210.4 = 10 309.6 W; missteps 230 x 50 = 11 500, 230 x 49 = 11 270, 45 x 212 = 9 540.
describe('marking choices', () => {
  it('computes options from key and missteps, printed alike, exactly one right', () => {
    const options = draw.parts[2]?.options ?? [];
    expect(options.map(({ text }) => text.replace(/\s/g, ' ')).sort()).toEqual(['10 310 W', '11 270 W', '11 500 W', '9 540 W']);
    expect(options.filter(({ right }) => right).map(({ text }) => text)).toEqual([draw.parts[2]?.key.text]);
    expect(draw.parts[2]?.key.value).toBe(letter('c', '310'));
  });

  it('awards the right option, in either case, and nothing to a letter that is not there', () => {
    expect(mark({ c: letter('c', '310').toLowerCase() })[2]).toMatchObject({ verdict: 'correct', awarded: 2 });
    expect(mark({ c: 'Q' })[2]).toMatchObject({ verdict: 'unread', awarded: 0 });
    expect(mark({})[2]).toMatchObject({ verdict: 'blank', awarded: 0 });
  });

  it('explains a misstep among the options', () => {
    expect(mark({ c: letter('c', '500') })[2]).toMatchObject({ verdict: 'misstep', awarded: 0, says: 'What went wrong: the power taken from the line.' });
    expect(mark({ c: letter('c', '270') })[2]).toMatchObject({ verdict: 'misstep', awarded: 0.5 });
    expect(mark({ d: letter('d', 'cannot') })[3]).toMatchObject({ verdict: 'misstep', awarded: 0 });
  });

  it('follows an earlier slip through to the option that it leads to', () => {
    const parts = mark({ a: '45 A', b: '212 V', c: letter('c', '540'), d: letter('d', 'No') });
    expect(parts.map(({ verdict }) => verdict)).toEqual(['wrong', 'carried', 'carried', 'carried']);
    expect(parts[3]?.carriedFrom).toEqual(['a']);
    expect(mark({ d: letter('d', 'No') })[3]).toMatchObject({ verdict: 'wrong', awarded: 0 });
    expect(mark({ a: '45 A', d: letter('d', 'Yes') })[3]?.verdict).toBe('correct');
  });

  it('takes marks away for a wrong option only where the policy says so', () => {
    expect(mark({ d: letter('d', 'No') }, { wrongOptionCosts: 0.25 })[3]?.awarded).toBe(-0.25);
    expect(Object.is(mark({ d: letter('d', 'No') })[3]?.awarded, 0)).toBe(true);
  });

  it('shuffles options by a stream of their own: every place holds the key about as often', () => {
    const places = [0, 0, 0, 0];
    for (let seed = 0; seed < 400; seed += 1) {
      const at = 'ABCD'.indexOf(String(drawOf(template, `s-${seed}`).parts[2]?.key.value));
      places[at] = (places[at] ?? 0) + 1;
    }
    // 100 expected in each; 5 standard deviations of a binomial(400, 1/4) are 43.
    for (const count of places) expect(Math.abs(count - 100)).toBeLessThan(43);
  });
});
