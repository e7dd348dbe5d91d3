/** `{{V}}` and `{{part.a}}`: the leftmost match, so that TeX's `\frac{{{V}}}{2}` holds the placeholder between braces. */
export const placeholder = /\{\{\s*(part\.[a-z][a-z0-9_]*|[A-Za-z][A-Za-z0-9_]*)\s*\}\}/g;

/** Names in placeholders, each once, in order. */
export const placeholdersIn = (text: string): string[] => [...new Set([...text.matchAll(placeholder)].map((match) => match[1] ?? ''))];

/** Text with each placeholder replaced. */
export const replacePlaceholders = (text: string, by: (name: string) => string): string =>
  text.replace(placeholder, (_, name: string) => by(name));

/** A text cut at its placeholders: plain pieces and names in turn. */
export function cutAtPlaceholders(text: string): ({ text: string } | { name: string })[] {
  const pieces: ({ text: string } | { name: string })[] = [];
  let from = 0;
  for (const match of text.matchAll(placeholder)) {
    if (match.index > from) pieces.push({ text: text.slice(from, match.index) });
    pieces.push({ name: match[1] ?? '' });
    from = match.index + match[0].length;
  }
  if (from < text.length) pieces.push({ text: text.slice(from) });
  return pieces;
}
