import { cleanup, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, describe, expect, test } from 'vitest';
import { Clock } from '@/components/ui/Clock';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { RatingPlate } from '@/components/ui/RatingPlate';
import { StateMark } from '@/components/ui/StateMark';
import { lookOf, states, type Thing } from '@/components/ui/states';
import { TextInput } from '@/components/ui/TextInput';
import { checkStates, templateStates } from '@/lib/bank/model';
import { candidateStates } from '@/lib/candidates/model';
import { examStates } from '@/lib/exams/model';
import { mailStates } from '@/lib/mail/model';
import { accountStates } from '@/lib/people/model';
import { paperStates } from '@/lib/planning/model';
import { sittingStates } from '@/lib/sittings/model';

afterEach(cleanup);

describe('StateMark', () => {
  test('prints a word and a shape for every state, and no two states of a thing look alike', () => {
    for (const thing of Object.keys(states) as Thing[]) {
      const looks = Object.keys(states[thing]).map((state) => lookOf(thing, state as never));
      expect(new Set(looks.map((look) => look.shape)).size, thing).toBe(looks.length);
      expect(looks.every((look) => look.word.length > 0)).toBe(true);
    }
    const { container } = render(<StateMark thing="candidate" state="on rest break" />);
    expect(container.textContent).toBe('on rest break');
    expect(container.querySelector('svg[aria-hidden] > *')).not.toBeNull();
  });

  test('knows the states that the rules know', () => {
    const known: [Thing, readonly string[]][] = [
      ['candidate', candidateStates],
      ['template', templateStates],
      ['exam', examStates],
      ['sitting', sittingStates],
      ['papers', paperStates],
      ['e-mail', mailStates],
      ['account', accountStates],
    ];
    for (const [thing, words] of known) expect(Object.keys(states[thing]).sort(), thing).toEqual([...words].sort());
    expect(Object.keys(states.check)).toEqual(expect.arrayContaining([...checkStates]));
  });
});

describe('ErrorSummary and fields', () => {
  function Sample() {
    const [attempt, setAttempt] = useState(0);
    const errors = attempt === 0 ? [] : [{ field: 'minutes', says: 'Write whole minutes, 10 to 300.' }];
    return (
      <form
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          setAttempt(attempt + 1);
        }}
      >
        <ErrorSummary errors={errors} attempt={attempt} />
        <TextInput label="Time allowed" name="minutes" defaultValue="5 hours" help="In minutes." error={errors[0]?.says} />
        <button type="submit">Save</button>
      </form>
    );
  }

  test('takes focus at each attempt, leads to the field, and nothing typed is lost', async () => {
    const user = userEvent.setup();
    render(<Sample />);
    await user.click(screen.getByRole('button', { name: 'Save' }));
    const summary = screen.getByRole('group', { name: 'Put this right first' });
    expect(document.activeElement).toBe(summary);
    await user.click(screen.getByRole('button', { name: 'Save' }));
    expect(document.activeElement).toBe(summary);
    await user.click(screen.getByRole('link', { name: 'Write whole minutes, 10 to 300.' }));
    const field = screen.getByRole<HTMLInputElement>('textbox', { name: 'Time allowed' });
    expect(document.activeElement).toBe(field);
    expect(field.value).toBe('5 hours');
    expect(field.getAttribute('aria-invalid')).toBe('true');
    const described = (field.getAttribute('aria-describedby') ?? '').split(' ').map((id) => document.getElementById(id)?.textContent);
    expect(described).toEqual(['Write whole minutes, 10 to 300.', 'In minutes.']);
  });
});

describe('Clock', () => {
  test('announces 10, 5 and 1 minutes once each, and nothing between', () => {
    const said: string[] = [];
    const { rerender } = render(<Clock seconds={615} says="left" />);
    for (let seconds = 612; seconds >= 0; seconds -= 4) {
      rerender(<Clock seconds={seconds} says="left" />);
      const now = screen.getByRole('status').textContent ?? '';
      if (now !== (said.at(-1) ?? '')) said.push(now);
    }
    expect(said).toEqual(['10 minutes left', '5 minutes left', '1 minute left']);
    expect(screen.getByRole('timer').textContent).toBe('0:00:00');
  });

  test('what the candidate hid comes back in the last 5 minutes', () => {
    const { rerender } = render(<Clock seconds={301} says="left" hidden onHide={() => undefined} />);
    expect(screen.getByRole('timer').textContent).toBe('–:––');
    rerender(<Clock seconds={300} says="left" hidden onHide={() => undefined} />);
    expect(screen.getByRole('timer').textContent).toBe('0:05:00');
    expect(screen.queryByRole('button')).toBeNull();
  });
});

describe('RatingPlate', () => {
  test('is a list of terms to a screen reader; the gap of thousands is not in the text', () => {
    render(<RatingPlate label="Given values" kind="drawn" cells={[{ label: 'Speed', symbol: 'n_1', value: '1150', unit: 'r/min' }]} />);
    expect(screen.getByRole('group', { name: 'Given values' })).toBeTruthy();
    expect(screen.getByRole('term').textContent).toBe('Speed n1');
    expect(screen.getByRole('definition').textContent).toBe('1150r/min');
  });
});
