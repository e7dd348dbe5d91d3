import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { kindsInWords, newTemplateInput, slugOf, slugText, templateStates } from '@/lib/bank/model';
import { isAuthor, mayDecide, mayUseBank } from '@/lib/bank/policy';
import { nextState, type TemplateEvent } from '@/lib/bank/rules';
import { type Actor, roles } from '@/lib/context';

const events: TemplateEvent[] = ['edit', 'ask', 'take-back', 'approve', 'return', 'retire'];

describe('the states of a template', () => {
  it('are never left, whatever happens, and nothing follows retirement', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom(...events)), (history) => {
      let now = { state: 'draft' as (typeof templateStates)[number], inUse: false };
      for (const event of history) {
        const next = nextState(now, event);
        if (!next.ok) {
          expect(next.says).not.toBe('');
          continue;
        }
        expect(templateStates).toContain(next.state);
        expect(now.state).not.toBe('retired');
        // Only a review approves, and only what was approved once can be retired.
        if (next.state === 'approved') expect([now.state, event]).toEqual(['in review', 'approve']);
        if (next.state === 'retired') expect(now.inUse).toBe(true);
        now = { state: next.state, inUse: now.inUse || next.state === 'approved' };
      }
    }));
  });

  it('go draft, in review, approved; an edit of an approved text is a draft beside the version in use', () => {
    expect(nextState({ state: 'draft', inUse: false }, 'ask')).toEqual({ ok: true, state: 'in review' });
    expect(nextState({ state: 'in review', inUse: false }, 'return')).toEqual({ ok: true, state: 'draft' });
    expect(nextState({ state: 'in review', inUse: false }, 'edit')).toMatchObject({ ok: false, code: 'in-review' });
    expect(nextState({ state: 'approved', inUse: true }, 'edit')).toEqual({ ok: true, state: 'draft' });
    expect(nextState({ state: 'draft', inUse: false }, 'retire')).toMatchObject({ ok: false, code: 'not-approved' });
  });
});

describe('who may', () => {
  const actorOf = (id: string, ...held: (typeof roles)[number][]): Actor => ({ kind: 'account', id, name: id, roles: new Set(held) });

  it('use the bank: instructors alone', () => {
    expect(roles.filter((role) => mayUseBank(actorOf('a', role)))).toEqual(['instructor']);
    expect(mayUseBank({ kind: 'system', name: 'job' })).toBe(false);
  });

  it('decide: an instructor who neither wrote nor asked', () => {
    const version = { askedBy: 'asker', writers: ['one', 'two'] };
    for (const author of ['asker', 'one', 'two']) expect([isAuthor(author, version), mayDecide(actorOf(author, 'instructor'), version)]).toEqual([true, false]);
    expect(mayDecide(actorOf('third', 'instructor'), version)).toBe(true);
    expect(mayDecide(actorOf('third', 'registrar', 'proctor'), version)).toBe(false);
  });
});

describe('words', () => {
  it('make a slug of any title that has letters', () => {
    expect(slugOf('Ohm’s law: première leçon (2)')).toBe('ohm-s-law-premiere-lecon-2');
    fc.assert(fc.property(fc.string(), (title) => {
      const slug = slugOf(`a${title}`);
      expect(slug === 'new' || slugText.safeParse(slug).success).toBe(true);
    }));
    expect(newTemplateInput.safeParse({ title: 'T', slug: 'new', area: 'dc-motors', level: '2' }).success).toBe(false);
  });

  it('count kinds', () => {
    expect(kindsInWords(['number', 'choice', 'number'])).toBe('2 numbers, 1 choice');
  });
});
