import type { RoomClient, SavedRevision } from './client';
import { mostRevisionsAtOnce } from './limits';
import type { KeptEntry } from './vault';

export type AnswerState = 'blank' | 'saved' | 'sending' | 'kept here';
export type OutboxView = {
  /** Answer texts by `question/part`. */
  answers: ReadonlyMap<string, string>;
  states: ReadonlyMap<string, AnswerState>;
  /** Answers that are not on the server. */
  waiting: number;
  contact: boolean;
  /** Why the server takes no more, once it said so for good. */
  closed: 'ended' | 'other-device' | null;
};
export type Keeper = { keepEntry(entry: KeptEntry): Promise<void> };

export const placeOf = (question: number, part: string): string => `${question}/${part}`;

const soon = 500;
const longest = 15_000;

/**
 * Answers of one candidate on one device. Each keystroke is a revision with the next sequence number, kept on the device at
 * once and sent shortly after; the server's acknowledgement counts by sequence. What fails is sent again with growing pauses
 * and some chance in them, so that a whole room that comes back does not come at one moment.
 */
export class Outbox {
  #entries = new Map<string, KeptEntry>();
  #listeners = new Set<() => void>();
  #timer: ReturnType<typeof setTimeout> | undefined;
  #sending = false;
  #sequence = 0;
  #pause = 0;
  #view: OutboxView = { answers: new Map(), states: new Map(), waiting: 0, contact: true, closed: null };

  constructor(readonly client: Pick<RoomClient, 'save'>, readonly keeper: Keeper, readonly now: () => number) {}

  subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  snapshot = (): OutboxView => this.#view;

  /** Joins what the device kept with what the server has: of each part the higher sequence counts. */
  begin(kept: readonly KeptEntry[], server: readonly (SavedRevision & { answer: string })[]): void {
    for (const entry of kept) this.#entries.set(placeOf(entry.question, entry.part), entry);
    for (const row of server) {
      const own = this.#entries.get(placeOf(row.question, row.part));
      if (own && own.sequence > row.sequence) continue;
      this.#entries.set(placeOf(row.question, row.part), { ...row, savedSequence: row.sequence, typedAt: own?.typedAt ?? 0 });
    }
    for (const entry of this.#entries.values()) this.#sequence = Math.max(this.#sequence, entry.sequence);
    this.#tell();
    if (this.#view.waiting > 0) this.#schedule(0);
  }

  /** A new text of a part. Resolves once it is kept on this device. */
  async write(question: number, part: string, answer: string): Promise<void> {
    const place = placeOf(question, part);
    const before = this.#entries.get(place);
    if (before?.answer === answer || (!before && answer === '')) return;
    const entry = { question, part, sequence: ++this.#sequence, savedSequence: before?.savedSequence ?? 0, answer, typedAt: Math.max(0, Math.round(this.now())) };
    this.#entries.set(place, entry);
    this.#tell();
    this.#schedule(soon);
    await this.keeper.keepEntry(entry);
  }

  /** The next sequence for something else that is ordered with the answers, such as a flag. */
  nextSequence(): number {
    return ++this.#sequence;
  }

  /** The network is back or the clock runs again: send what waits, at a moment of chance within `spread` ms. */
  wake(spread = 0): void {
    this.#pause = 0;
    if (this.#view.closed === 'ended') this.#tell({ closed: null });
    if (this.#view.waiting > 0) this.#schedule(Math.random() * spread, true);
  }

  /** Sends all that waits and says whether everything is on the server now. */
  async drain(): Promise<boolean> {
    for (let tries = 0; tries < 20 && this.#view.waiting > 0 && !this.#view.closed; tries += 1) {
      if (this.#sending) await new Promise((resolve) => setTimeout(resolve, 100));
      else if (!(await this.#send())) break;
    }
    return this.#view.waiting === 0;
  }

  stop(): void {
    clearTimeout(this.#timer);
  }

  #waiting(): KeptEntry[] {
    return [...this.#entries.values()].filter((entry) => entry.savedSequence < entry.sequence).sort((a, b) => a.sequence - b.sequence);
  }

  #schedule(wait: number, sooner = false): void {
    if (this.#view.closed) return;
    if (this.#timer !== undefined && !sooner) return;
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => {
      this.#timer = undefined;
      void this.#send();
    }, Math.max(wait, sooner ? 0 : this.#pause));
  }

  /** Sends the oldest that wait; true when the server answered. */
  async #send(): Promise<boolean> {
    const batch = this.#waiting().slice(0, mostRevisionsAtOnce);
    if (this.#sending || batch.length === 0 || this.#view.closed) return true;
    this.#sending = true;
    this.#tell();
    const answer = await this.client.save(batch.map(({ question, part, sequence, answer: text, typedAt }) => ({ question, part, sequence, answer: text, typedAt })));
    this.#sending = false;
    if (answer.ok) this.#acknowledge(batch, answer.saved);
    else if (answer.claimed) await this.#refused(answer.code, batch, answer.claimed);
    else await this.#refused(answer.code, batch, []);
    return answer.ok;
  }

  #acknowledge(batch: readonly KeptEntry[], saved: readonly SavedRevision[]): void {
    this.#pause = 0;
    const taken = new Set(saved.map((row) => `${placeOf(row.question, row.part)} ${row.sequence}`));
    for (const sent of batch) {
      const place = placeOf(sent.question, sent.part);
      const entry = this.#entries.get(place);
      if (!entry) continue;
      const stored = taken.has(`${place} ${sent.sequence}`);
      // Another text stands under this sequence (a second window wrote it): take the next one.
      const next = stored ? { ...entry, savedSequence: Math.max(entry.savedSequence, sent.sequence) } : entry.sequence === sent.sequence ? { ...entry, sequence: ++this.#sequence } : entry;
      this.#entries.set(place, next);
      void this.keeper.keepEntry(next);
    }
    this.#tell({ contact: true });
    if (this.#waiting().length > 0) this.#schedule(soon);
  }

  async #refused(code: string, batch: readonly KeptEntry[], claimed: readonly SavedRevision[]): Promise<void> {
    if (code === 'ended' && claimed.length > 0) this.#acknowledge(batch, claimed);
    if (code === 'ended' || code === 'other-device') {
      this.stop();
      this.#tell({ contact: true, closed: code });
      return;
    }
    this.#tell({ contact: code !== 'no-contact' });
    this.#pause = Math.min(longest, Math.max(1_000, this.#pause * 2)) * (0.75 + Math.random() / 2);
    this.#schedule(this.#pause);
  }

  #stateOf(entry: KeptEntry, contact: boolean): AnswerState {
    if (entry.savedSequence < entry.sequence) return contact ? 'sending' : 'kept here';
    return entry.answer === '' ? 'blank' : 'saved';
  }

  #tell(change: Partial<Pick<OutboxView, 'contact' | 'closed'>> = {}): void {
    const { contact, closed } = { ...this.#view, ...change };
    this.#view = {
      contact,
      closed,
      answers: new Map([...this.#entries].map(([place, entry]) => [place, entry.answer])),
      states: new Map([...this.#entries].map(([place, entry]) => [place, this.#stateOf(entry, contact)])),
      waiting: this.#waiting().length,
    };
    for (const listener of this.#listeners) listener();
  }
}
