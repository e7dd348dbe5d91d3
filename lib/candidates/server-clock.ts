/**
 * The server's time in a browser whose own clock may be wrong by hours. The offset is measured against the monotonic
 * clock over several exchanges; the one with the shortest way there and back counts. After a sleep it is measured anew.
 */
export class ServerClock {
  #offset: number | null = null;
  #way = Infinity;

  constructor(readonly monotonic: () => number = () => performance.now(), readonly wall: () => number = () => Date.now()) {}

  /** One exchange: when it was sent and answered [ms, monotonic], and the server's time in it [ms]. */
  sample(sent: number, answered: number, server: number): void {
    const way = answered - sent;
    if (way > this.#way) return;
    this.#way = way;
    this.#offset = server + way / 2 - answered;
  }

  /** Forgets how good the last measurement was, so that the next one counts: after a sleep or a long silence. */
  doubt(): void {
    this.#way = Infinity;
  }

  get measured(): boolean {
    return this.#offset !== null;
  }

  /** The server's time now [ms]; before any exchange the browser's own, moved by `wallOffset` where one is known. */
  now(wallOffset = 0): number {
    return this.#offset === null ? this.wall() + wallOffset : this.monotonic() + this.#offset;
  }
}
