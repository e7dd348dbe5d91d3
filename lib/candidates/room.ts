import { type OpenedPaper, type Refused, roomClient, type RoomClient } from './client';
import type { RoomCover, RoomState } from './model';
import { Outbox } from './outbox';
import { ServerClock } from './server-clock';
import { deviceName, holdRoom, placeOnDevice } from './this-device';
import { Vault } from './vault';

/** Where the room stands for this browser: what there is to show. */
export type RoomPhase =
  | 'entering' | 'no-contact' | 'signed-out' | 'not-here' | 'other-window' | 'other-device'
  | 'waiting' | 'cover' | 'writing' | 'stopped' | 'ended' | 'refused';

export type RoomView = {
  phase: RoomPhase;
  cover: RoomCover | null;
  state: RoomState | null;
  paper: OpenedPaper['content'] | null;
  flags: ReadonlySet<number>;
  /** Whether the server was heard lately. */
  contact: boolean;
  busy: boolean;
  says: string;
};

type Kept = { cover: RoomCover; state: RoomState; content: OpenedPaper['content'] | null; flags: number[]; wallOffset: number };

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const waits = 3_000;
const polls = 5_000;

const phaseOf = (state: RoomState): RoomPhase => {
  switch (state.state) {
    case 'expected': return 'waiting';
    case 'admitted': return 'cover';
    case 'writing': return 'writing';
    case 'paused':
    case 'on rest break': return 'stopped';
    case 'refused':
    case 'absent': return 'refused';
    default: return 'ended';
  }
};

/** The exam room of one sitting in this window: enters, follows the server, keeps the paper, and holds the outbox. */
export class Room {
  readonly client: RoomClient;
  readonly clock = new ServerClock();
  readonly outbox: Outbox;
  #vault: Vault | null = null;
  #listeners = new Set<() => void>();
  #timers = new Set<ReturnType<typeof setTimeout>>();
  #stream: EventSource | null = null;
  #wallOffset = 0;
  #leave: () => void = () => undefined;
  #left = false;
  #flagOrder = new Map<number, number>();
  #view: RoomView = { phase: 'entering', cover: null, state: null, paper: null, flags: new Set(), contact: true, busy: false, says: '' };

  constructor(readonly sittingId: string) {
    this.client = roomClient(sittingId);
    this.outbox = new Outbox(this.client, { keepEntry: async (entry) => this.#vault?.keepEntry(entry) }, () => this.now());
    this.outbox.subscribe(() => {
      const { contact, closed } = this.outbox.snapshot();
      if (closed === 'other-device') this.#lost('other-device', 'This paper was moved to another device.');
      else if (closed === 'ended') void this.refresh();
      if (contact !== this.#view.contact) this.#show({ contact });
    });
  }

  subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };
  snapshot = (): RoomView => this.#view;
  /** The server's time now [ms]. */
  now = (): number => this.clock.now(this.#wallOffset);

  /** Enters the room and follows it until `leave`. */
  async enter(): Promise<void> {
    const release = new Promise<void>((resolve) => { this.#leave = resolve; });
    this.#left = false;
    // A window that was just reloaded may take a moment to let go.
    const held = (await holdRoom(this.sittingId, release)) || (await pause(400), await holdRoom(this.sittingId, release));
    if (this.#left) return;
    if (!held) return this.#show({ phase: 'other-window' });
    addEventListener('online', this.#online);
    document.addEventListener('visibilitychange', this.#seen);
    await this.#recall();
    await this.#ask();
  }

  leave(): void {
    this.#left = true;
    this.#leave();
    this.#stream?.close();
    this.outbox.stop();
    for (const timer of this.#timers) clearTimeout(timer);
    removeEventListener('online', this.#online);
    document.removeEventListener('visibilitychange', this.#seen);
  }

  #online = (): void => {
    this.outbox.wake(3_000);
    void this.refresh();
  };
  #seen = (): void => {
    if (document.visibilityState !== 'visible') return;
    this.clock.doubt();
    void this.refresh();
  };

  #show(change: Partial<RoomView>): void {
    this.#view = { ...this.#view, ...change };
    for (const listener of this.#listeners) listener();
  }

  #later(wait: number, work: () => void): void {
    if (this.#left) return;
    const timer = setTimeout(() => {
      this.#timers.delete(timer);
      work();
    }, wait * (0.8 + Math.random() * 0.4));
    this.#timers.add(timer);
  }

  /** Shows what this device kept of the paper, for a reload without network. */
  async #recall(): Promise<void> {
    const place = placeOnDevice.read(this.sittingId);
    if (!place) return;
    this.#vault = await Vault.open(place);
    const kept = await this.#vault.readPaper<Kept>().catch(() => null);
    if (!kept) return;
    this.#wallOffset = kept.wallOffset;
    this.outbox.begin(await this.#vault.readEntries(), []);
    this.#show({ cover: kept.cover, state: kept.state, paper: kept.content, flags: new Set(kept.flags), phase: kept.content ? phaseOf(kept.state) : 'entering' });
  }

  async #ask(): Promise<void> {
    const sent = performance.now();
    const answer = await this.client.seat(deviceName());
    if (this.#left) return;
    if (!answer.ok) return this.#notSeated(answer);
    this.clock.sample(sent, performance.now(), answer.state.now);
    this.#show({ cover: answer.cover, contact: true });
    if (!answer.seated) {
      this.#show({ state: answer.state, phase: phaseOf(answer.state) });
      return this.#later(waits, () => void this.#ask());
    }
    const place = `${this.sittingId}/${answer.state.candidateId}`;
    if (!this.#vault || this.#vault.place !== place) this.#vault = await Vault.open(place);
    placeOnDevice.keep(this.sittingId, place);
    await this.#take(answer.state);
    this.#follow();
    for (let exchange = 0; exchange < 3; exchange += 1) await this.refresh();
  }

  #notSeated(answer: Refused): void {
    if (answer.code === 'no-contact') {
      this.#show(this.#view.paper ? { contact: false } : { contact: false, phase: 'no-contact' });
      return this.#later(waits, () => void this.#ask());
    }
    if (answer.code === 'signed-out') return this.#show({ phase: 'signed-out', says: answer.says });
    if (answer.code === 'other-device') {
      this.#lost('other-device', answer.says);
      return this.#later(polls, () => void this.#ask());
    }
    this.#show({ phase: 'not-here', says: answer.says });
  }

  /** The seat is elsewhere now: nothing is shown and nothing is taken here any more. */
  #lost(phase: 'other-device', says: string): void {
    this.#stream?.close();
    this.#stream = null;
    this.#show({ phase, says, paper: null });
  }

  /** Takes a state that the server told. */
  async #take(state: RoomState): Promise<void> {
    const before = this.#view.state;
    if (before && before.candidateId === state.candidateId && before.now > state.now) return;
    this.#show({ state, contact: true, phase: phaseOf(state) });
    const sitsNow = state.state === 'writing' || state.state === 'paused' || state.state === 'on rest break';
    if (sitsNow && !this.#view.paper) await this.#openPaper();
    if (state.state === 'writing' && before?.state !== 'writing') this.outbox.wake(500);
    await this.#keep();
    if (phaseOf(state) === 'ended') await this.#finish();
  }

  async #openPaper(): Promise<void> {
    const answer = await this.client.paper();
    if (!answer.ok) return this.#later(1_000, () => void this.#openPaper());
    const { content, answers, flags } = answer.paper;
    for (const flag of flags) this.#flagOrder.set(flag.question, flag.sequence);
    this.outbox.begin((await this.#vault?.readEntries()) ?? [], answers);
    this.#show({ paper: content, flags: new Set(flags.filter((flag) => flag.flagged).map((flag) => flag.question)) });
    await this.#keep();
  }

  async #keep(): Promise<void> {
    const { cover, state, paper: content, flags } = this.#view;
    if (!cover || !state) return;
    const kept: Kept = { cover, state, content, flags: [...flags], wallOffset: this.clock.measured ? this.clock.now() - Date.now() : this.#wallOffset };
    await this.#vault?.keepPaper(kept).catch(() => undefined);
  }

  /** Once all of an ended paper is on the server, the device forgets it. */
  async #finish(): Promise<void> {
    this.outbox.stop();
    if (await this.outbox.drain()) {
      await this.#vault?.forget().catch(() => undefined);
      placeOnDevice.forget(this.sittingId);
    }
  }

  #follow(): void {
    if (this.#stream || this.#left) return;
    const stream = new EventSource(this.client.streamPath);
    this.#stream = stream;
    stream.addEventListener('state', (event) => void this.#take(JSON.parse((event as MessageEvent<string>).data) as RoomState));
    stream.addEventListener('moved', () => this.#lost('other-device', 'This paper was moved to another device, or taken out of the sitting.'));
    stream.onopen = () => {
      this.#show({ contact: true });
      this.outbox.wake(2_000);
    };
    stream.onerror = () => {
      this.#show({ contact: false });
      if (stream.readyState !== EventSource.CLOSED) return;
      this.#stream = null;
      this.#later(polls, () => {
        void this.refresh();
        this.#follow();
      });
    };
  }

  /** Asks for the state: measures the clock, and is what is left while no stream lives. */
  async refresh(): Promise<void> {
    const sent = performance.now();
    const answer = await this.client.state();
    if (this.#left || this.#view.phase === 'other-device') return;
    if (!answer.ok) {
      if (answer.code === 'no-contact') this.#show({ contact: false });
      return;
    }
    this.clock.sample(sent, performance.now(), answer.state.now);
    await this.#take(answer.state);
  }

  async toggleFlag(question: number): Promise<void> {
    const flagged = !this.#view.flags.has(question);
    const flags = new Set(this.#view.flags);
    if (flagged) flags.add(question);
    else flags.delete(question);
    this.#show({ flags });
    void this.#keep();
    const sequence = Math.max(this.outbox.nextSequence(), (this.#flagOrder.get(question) ?? 0) + 1);
    this.#flagOrder.set(question, sequence);
    await this.client.flag({ question, sequence, flagged });
  }

  async declare(): Promise<void> {
    await this.#do(() => this.client.declare());
  }
  async callHelp(): Promise<void> {
    await this.#do(() => this.client.help());
  }

  /** Sends what waits, then hands in. Without contact nothing is handed in and everything stays here. */
  async handIn(): Promise<boolean> {
    const answer = await this.#do(async () => {
      if (!(await this.outbox.drain()) && this.outbox.snapshot().closed === null) return { ok: false, code: 'no-contact', says: '' } as const;
      return this.client.handIn();
    });
    return answer.ok;
  }

  async #do<Answer extends { ok: true } | Refused>(work: () => Promise<Answer>): Promise<Answer> {
    this.#show({ busy: true, says: '' });
    const answer = await work();
    const says = answer.ok ? '' : answer.code === 'no-contact' ? 'There is no contact with the server. Everything you wrote is kept on this device. Try again, or call the proctor.' : answer.says;
    this.#show({ busy: false, says });
    await this.refresh();
    return answer;
  }
}
