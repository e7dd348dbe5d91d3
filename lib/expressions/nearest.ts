/** Changes of one sign (insert, leave out, replace) between two short texts. */
function distance(a: string, b: string): number {
  let before = Array.from({ length: b.length + 1 }, (_, i) => i);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const replaced = (before[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1);
      row.push(Math.min(replaced, (before[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1));
    }
    before = row;
  }
  return before[b.length] ?? 0;
}

/** The known word that was probably meant: the same in another case, or at most two signs (half of them) away; else null. */
export function nearest(word: string, known: Iterable<string>): string | null {
  let best: { name: string; cost: number } | null = null;
  for (const name of known) {
    if (word.length > 64 || name.length > 64) continue;
    const cost = name.toLowerCase() === word.toLowerCase() ? 0 : distance(word, name);
    if (cost <= Math.min(2, Math.max(1, word.length / 2)) && (!best || cost < best.cost)) best = { name, cost };
  }
  return best?.name ?? null;
}

/** ` Did you mean …?`, or nothing. */
export function suggestion(word: string, known: Iterable<string>): string {
  const name = nearest(word, known);
  return name === null ? '' : ` Did you mean ${name}?`;
}
