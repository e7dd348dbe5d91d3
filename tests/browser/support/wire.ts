import type { BrowserContext, Page, Response } from '@playwright/test';

export type Heard = { url: string; text: string };

/** Everything that a browser receives: heads and bodies of all answers, and each message of the streams. */
export class Wire {
  readonly #heard: Heard[] = [];
  readonly #reading: Promise<void>[] = [];
  readonly #again = new Set<string>();

  constructor(readonly context: BrowserContext) {
    context.on('response', (response) => this.#reading.push(this.#read(response)));
  }

  /** Listens to the streams of a page too: their answers never end, so their messages are taken as they come. */
  async follow(page: Page): Promise<void> {
    const devtools = await this.context.newCDPSession(page);
    devtools.on('Network.eventSourceMessageReceived', (message) => this.#heard.push({ url: 'stream', text: message.data }));
    await devtools.send('Network.enable');
  }

  async #read(response: Response): Promise<void> {
    const url = response.url();
    const heads = await response.allHeaders().catch(() => ({}) as Record<string, string>);
    this.#heard.push({ url, text: JSON.stringify(heads) });
    if (heads['content-type']?.includes('event-stream') || (response.status() >= 300 && response.status() < 400)) return;
    const body = await response.body().catch(() => null);
    if (body) this.#heard.push({ url, text: body.toString('utf8') });
    else if (response.request().method() === 'GET') this.#again.add(url);
  }

  /** All that was heard. An answer whose bytes the browser had dropped already is asked for once more, as the same person. */
  async all(): Promise<readonly Heard[]> {
    await Promise.all(this.#reading);
    for (const url of this.#again) this.#heard.push({ url, text: await (await this.context.request.get(url)).text() });
    this.#again.clear();
    return this.#heard;
  }
}

const entities: Record<string, string> = { '&lt;': '<', '&gt;': '>', '&amp;': '&', '&quot;': '"', '&#x27;': "'", '&#39;': "'" };

/** Text as a reader of it would see it: escapes of JSON, of a page's payload and of HTML taken off, spaces drawn together. */
export const unescaped = (text: string): string =>
  text
    .replace(/\\+u([0-9a-f]{4})/gi, (_, code: string) => String.fromCharCode(parseInt(code, 16)))
    .replace(/\\+n/g, ' ')
    .replace(/\\+"/g, '"')
    .replace(/&(?:lt|gt|amp|quot|#x27|#39);/g, (entity) => entities[entity] ?? entity)
    .replace(/\s+/g, ' ');
