/** How a part's key lies over the draws of a check, in the part's unit. */
export interface Quantiles { min: number; p05: number; median: number; p95: number; max: number }
/** One bar of a histogram: keys from `from` up to `to`. */
export interface Bin { from: number; to: number; count: number }

const tidy = (value: number): number => Number(value.toPrecision(6));

/** Quantile by linear interpolation between the two nearest of the sorted values. */
const quantile = (sorted: readonly number[], share: number): number => {
  const place = share * (sorted.length - 1);
  const low = sorted[Math.floor(place)] ?? 0;
  const high = sorted[Math.ceil(place)] ?? low;
  return low + (high - low) * (place - Math.floor(place));
};

export const quantilesOf = (values: readonly number[]): Quantiles => {
  const sorted = [...values].sort((a, b) => a - b);
  const at = (share: number) => tidy(quantile(sorted, share));
  return { min: at(0), p05: at(0.05), median: at(0.5), p95: at(0.95), max: at(1) };
};

/** A histogram of equal bars, 24 at most. */
export function binsOf(values: readonly number[], most = 24): Bin[] {
  if (values.length === 0) return [];
  const sorted = [...values].sort((a, b) => a - b);
  const [low, high] = [sorted[0] ?? 0, sorted.at(-1) ?? 0];
  if (low === high) return [{ from: tidy(low), to: tidy(high), count: sorted.length }];
  const bars = Math.min(most, Math.max(1, new Set(sorted).size));
  const width = (high - low) / bars;
  const counts = new Array<number>(bars).fill(0);
  for (const value of sorted) {
    const bar = Math.min(bars - 1, Math.floor((value - low) / width));
    counts[bar] = (counts[bar] ?? 0) + 1;
  }
  return counts.map((count, bar) => ({ from: tidy(low + bar * width), to: tidy(low + (bar + 1) * width), count }));
}
