import { subscribe } from './listener';

/** One event as it goes to the browser. `id` is what a browser sends back as Last-Event-ID when it connects again. */
export type StreamEvent = { event: string; data: unknown; id?: string };

export type StreamOptions = {
  /** Topics of lib/live/post that call for reading anew. */
  topics: readonly string[];
  /**
   * Reads what is to be sent now. `since` is the id sent last (or the browser's Last-Event-ID), null at first.
   * `end` closes the stream: the reader may not see this any more. Never called twice at once.
   */
  read(since: string | null): Promise<readonly StreamEvent[] | 'end'>;
  /** Reads anew after so many seconds even if nothing was heard; default 20. */
  refresh?: number;
};

const heartbeat = 10_000;
const gap = 250;

const shared = globalThis as typeof globalThis & { fullfieldStreams?: Set<() => void>; fullfieldClosing?: boolean };
const open = (): Set<() => void> => (shared.fullfieldStreams ??= new Set());

/** Closes all streams of this process and lets no new one open: a server that stops must not wait for them. */
export function closeStreams(): void {
  shared.fullfieldClosing = true;
  for (const close of [...open()]) close();
}

const encode = ({ event, data, id }: StreamEvent): string =>
  `${id === undefined ? '' : `id: ${id}\n`}event: ${event}\ndata: ${JSON.stringify(data)}\n\n`;

type Pump = { wake(): void; stop(): void };

/** Reads and sends one at a time, at most four times a second; a call during reading leads to one more reading. */
function pump(options: StreamOptions, first: string | null, send: (text: string) => void, end: () => void): Pump {
  let since = first;
  let wanted = false;
  let busy = false;
  let stopped = false;
  let timer: NodeJS.Timeout | undefined;
  const go = async () => {
    busy = true;
    wanted = false;
    try {
      const events = await options.read(since);
      if (stopped) return;
      if (events === 'end') return end();
      for (const event of events) {
        since = event.id ?? since;
        send(encode(event));
      }
    } catch {
      // The database is away: the browser keeps what it shows and the next reading makes it good.
      wanted = true;
    }
    timer = setTimeout(() => {
      busy = false;
      if (wanted && !stopped) void go();
    }, gap);
  };
  return {
    wake() {
      wanted = true;
      if (!busy && !stopped) void go();
    },
    stop() {
      stopped = true;
      clearTimeout(timer);
    },
  };
}

/**
 * A server-sent event stream: what `read` gives at once, and again after each change of a topic. Has a heartbeat, is never
 * buffered, ends with the browser, with `end` and with the server. The caller has checked who asks.
 */
export function eventStream(request: Request, options: StreamOptions): Response {
  if (shared.fullfieldClosing) return new Response(null, { status: 503, headers: { 'retry-after': '1' } });
  const text = new TextEncoder();
  let close = () => undefined as void;
  const body = new ReadableStream<Uint8Array>({
    start(controller) {
      const send = (piece: string) => controller.enqueue(text.encode(piece));
      const reader = pump(options, request.headers.get('last-event-id'), send, () => close());
      const endings = options.topics.map((topic) => subscribe(topic, reader.wake));
      const beat = setInterval(() => send(': here\n\n'), heartbeat);
      const refresh = setInterval(reader.wake, (options.refresh ?? 20) * 1000);
      let closed = false;
      close = () => {
        if (closed) return;
        closed = true;
        open().delete(close);
        reader.stop();
        clearInterval(beat);
        clearInterval(refresh);
        for (const end of endings) end();
        try {
          controller.close();
        } catch {
          // The browser closed it first.
        }
      };
      open().add(close);
      request.signal.addEventListener('abort', close, { once: true });
      send('retry: 1000\n\n');
      reader.wake();
    },
    cancel: () => close(),
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/event-stream; charset=utf-8',
      'cache-control': 'no-store, no-transform',
      'x-accel-buffering': 'no',
      connection: 'keep-alive',
    },
  });
}
