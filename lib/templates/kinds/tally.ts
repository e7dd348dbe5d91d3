/** Counts in how many draws something was so, and keeps the first five seeds. */
export class Tally {
  count = 0;
  readonly seeds: string[] = [];
  add(seed: string): void {
    this.count += 1;
    if (this.seeds.length < 5) this.seeds.push(seed);
  }
}
