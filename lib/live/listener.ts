import pg from 'pg';
import { connectionConfig } from '@/db/client';

/** Everything of ours goes through one channel; the topic is the payload: `sitting:<id>`. */
export const channel = 'fullfield';

type Wake = () => void;

/** One LISTEN connection a process, shared by all streams. */
class Listener {
  readonly #topics = new Map<string, Set<Wake>>();
  #client: pg.Client | undefined;
  #connecting = false;
  #closed = false;

  constructor(readonly url: string) {}

  subscribe(topic: string, wake: Wake): () => void {
    const wakes = this.#topics.get(topic) ?? new Set<Wake>();
    this.#topics.set(topic, wakes.add(wake));
    void this.#connect();
    return () => {
      wakes.delete(wake);
      if (wakes.size === 0 && this.#topics.get(topic) === wakes) this.#topics.delete(topic);
    };
  }

  async close(): Promise<void> {
    this.#closed = true;
    await this.#client?.end().catch(() => undefined);
  }

  async #connect(): Promise<void> {
    if (this.#client || this.#connecting || this.#closed) return;
    this.#connecting = true;
    const client = new pg.Client(connectionConfig(this.url, 'fullfield_candidate', 'fullfield listener'));
    client.on('notification', ({ payload }) => this.#topics.get(payload ?? '')?.forEach((wake) => wake()));
    const lost = () => {
      if (this.#client === client) this.#client = undefined;
      client.end().catch(() => undefined);
      if (!this.#closed) setTimeout(() => void this.#connect(), 500).unref();
    };
    client.once('error', lost);
    try {
      await client.connect();
      await client.query(`listen ${channel}`);
      this.#client = client;
      // What was posted while nobody listened is made good by reading anew.
      for (const wakes of this.#topics.values()) wakes.forEach((wake) => wake());
    } catch {
      lost();
    } finally {
      this.#connecting = false;
    }
  }
}

// On globalThis: bundles of several routes may each hold a copy of this file.
const shared = globalThis as typeof globalThis & { fullfieldListener?: Listener };

function listener(): Listener {
  const url = process.env.DATABASE_URL;
  if (!url) throw new Error('DATABASE_URL is not set.');
  return (shared.fullfieldListener ??= new Listener(url));
}

/**
 * Calls `wake` whenever something about `topic` changed in any process, and after the connection was lost and found again.
 * It carries no data: read what you show. Returns the way to end it.
 */
export const subscribe = (topic: string, wake: () => void): (() => void) => listener().subscribe(topic, wake);

export async function closeListener(): Promise<void> {
  const open = shared.fullfieldListener;
  shared.fullfieldListener = undefined;
  await open?.close();
}
