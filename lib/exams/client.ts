export const examKeys = { markdown: (text: string) => ['exams', 'markdown', text] as const };

/** Prints a text as a paper would; errors carry words that may be shown. */
export async function fetchMarkdown(text: string, signal?: AbortSignal): Promise<{ html: string }> {
  const response = await fetch('/api/exams/markdown', { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ text }), signal });
  const body: unknown = await response.json().catch(() => null);
  if (response.ok && typeof body === 'object' && body !== null && 'html' in body && typeof body.html === 'string') return { html: body.html };
  throw new Error(typeof body === 'object' && body !== null && 'says' in body ? String(body.says) : 'The server did not answer. The text stays here; try again in a moment.');
}
