import { type DBSchema, type IDBPDatabase, openDB } from 'idb';

/**
 * What the exam room keeps on this device: paper, state and outbox, so that a reload without network or a crash loses nothing.
 * It is encrypted under a key that never leaves the browser and cannot be exported. That keeps it from whoever copies the
 * profile's files or opens the store's export; it does not keep it from somebody who uses this very browser while the key is here.
 * Over plain http there is no WebCrypto: it is then kept unencrypted.
 */
type Sealed = { iv: Uint8Array<ArrayBuffer>; data: ArrayBuffer } | { plain: string };

export type KeptEntry = { question: number; part: string; sequence: number; savedSequence: number; answer: string; typedAt: number };
type StoredEntry = Omit<KeptEntry, 'answer'> & { id: string; place: string; sealed: Sealed };

interface RoomSchema extends DBSchema {
  keys: { key: string; value: CryptoKey };
  papers: { key: string; value: Sealed };
  entries: { key: string; value: StoredEntry; indexes: { place: string } };
}

/** The store of one place: one candidate of one sitting on this device. */
export class Vault {
  #queue: Promise<unknown> = Promise.resolve();

  private constructor(readonly place: string, readonly db: IDBPDatabase<RoomSchema>, readonly key: CryptoKey | null) {}

  static async open(place: string): Promise<Vault> {
    const db = await openDB<RoomSchema>('fullfield-room', 1, {
      upgrade(made) {
        made.createObjectStore('keys');
        made.createObjectStore('papers');
        made.createObjectStore('entries', { keyPath: 'id' }).createIndex('place', 'place');
      },
    });
    return new Vault(place, db, await keyOf(db, place));
  }

  async keepPaper(value: unknown): Promise<void> {
    await this.db.put('papers', await this.#seal(JSON.stringify(value)), this.place);
  }

  async readPaper<Value>(): Promise<Value | null> {
    const sealed = await this.db.get('papers', this.place);
    return sealed ? (JSON.parse(await this.#open(sealed)) as Value) : null;
  }

  /** Writes one entry; writes follow one another, so an older text never lands after a newer one. */
  keepEntry(entry: KeptEntry): Promise<void> {
    const { answer, ...plain } = entry;
    const write = this.#queue.then(async () => {
      const sealed = await this.#seal(answer);
      await this.db.put('entries', { ...plain, id: `${this.place}/${entry.question}/${entry.part}`, place: this.place, sealed });
    });
    this.#queue = write.catch(() => undefined);
    return write;
  }

  async readEntries(): Promise<KeptEntry[]> {
    const stored = await this.db.getAllFromIndex('entries', 'place', this.place);
    return Promise.all(stored.map(async ({ question, part, sequence, savedSequence, typedAt, sealed }) => ({
      question, part, sequence, savedSequence, typedAt, answer: await this.#open(sealed),
    })));
  }

  /** Removes everything of this sitting from the device: after the paper is handed in and all of it is on the server. */
  async forget(): Promise<void> {
    await this.#queue;
    const keys = await this.db.getAllKeysFromIndex('entries', 'place', this.place);
    await Promise.all([...keys.map((key) => this.db.delete('entries', key)), this.db.delete('papers', this.place), this.db.delete('keys', this.place)]);
  }

  async #seal(text: string): Promise<Sealed> {
    if (!this.key) return { plain: text };
    const iv = crypto.getRandomValues(new Uint8Array(12));
    return { iv, data: await crypto.subtle.encrypt({ name: 'AES-GCM', iv }, this.key, new TextEncoder().encode(text)) };
  }

  async #open(sealed: Sealed): Promise<string> {
    if ('plain' in sealed) return sealed.plain;
    if (!this.key) throw new Error('The key of this paper is not on this device.');
    return new TextDecoder().decode(await crypto.subtle.decrypt({ name: 'AES-GCM', iv: sealed.iv }, this.key, sealed.data));
  }
}

async function keyOf(db: IDBPDatabase<RoomSchema>, place: string): Promise<CryptoKey | null> {
  if (typeof crypto.subtle === 'undefined') return null;
  const kept = await db.get('keys', place);
  if (kept) return kept;
  const made = await crypto.subtle.generateKey({ name: 'AES-GCM', length: 256 }, false, ['encrypt', 'decrypt']);
  await db.put('keys', made, place);
  return made;
}
