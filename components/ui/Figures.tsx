/** Spaces a number may be grouped with: no-break, thin, narrow no-break. */
const gaps = /[\u00a0\u2009\u202f]/;

/**
 * A number as it prints: groups of three stand apart by a gap that is style, not text, so that copying and a
 * screen reader get "1150". `text` may be grouped by thin spaces already, or be bare digits ("1150", "-12500.5").
 */
export function Figures({ text }: { text: string }) {
  const bare = /^([-−]?)(\d{4,})([.,]\d+)?$/.exec(text);
  const groups = gaps.test(text) ? text.split(gaps) : bare ? grouped(bare[1] ?? '', bare[2] ?? '', bare[3] ?? '') : [text];
  return groups.map((group, place) => (place === 0 ? group : <span className="g" key={place}>{group}</span>));
}

function grouped(sign: string, whole: string, rest: string): string[] {
  const head = whole.length % 3 || 3;
  const groups = [sign + whole.slice(0, head)];
  for (let at = head; at < whole.length; at += 3) groups.push(whole.slice(at, at + 3));
  groups[groups.length - 1] += rest;
  return groups;
}
