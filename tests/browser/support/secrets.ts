import { parse } from 'yaml';
import type { Draw } from '@/lib/templates/draw';
import { database } from './database';
import { type Heard, unescaped } from './wire';

/** What must not reach a candidate. `words` anywhere; `figures`, printed keys that stand on no paper, where a page or data is meant. */
export type Secrets = { words: ReadonlySet<string>; figures: ReadonlySet<string> };

const squeeze = (text: string): string => text.replace(/\s+/g, ' ').trim();

/** Every text of a template that gives its working away: formulas, and the words of missteps and solution between their figures. */
function textsOf(source: string): string[] {
  const found: string[] = [];
  const walk = (value: unknown, name: string): void => {
    if (Array.isArray(value)) value.forEach((inner) => walk(inner, name));
    else if (value !== null && typeof value === 'object') for (const [inner, held] of Object.entries(value)) walk(held, name === 'derive' && typeof held === 'string' ? 'key' : inner);
    else if (typeof value === 'string') {
      if (['key', 'require', 'where'].includes(name) && /[-+*/<>]/.test(value) && squeeze(value).length >= 6) found.push(squeeze(value));
      if (name === 'says' && value.length >= 15) found.push(squeeze(value));
      if (name === 'solution') found.push(...value.split(/\{\{.*?\}\}|\$|\n\s*\n/).map(squeeze).filter((piece) => piece.length >= 20));
    }
  };
  walk(parse(source), '');
  return found;
}

const full = (value: unknown): string[] => (typeof value === 'number' && String(value).length >= 9 ? [String(value)] : []);

function figuresOf(draws: readonly Draw[]): Set<string> {
  const printed = draws.flatMap((draw) => [...Object.values(draw.given), ...Object.values(draw.derived)].flatMap((one) => (one.text ? [one.text] : [])));
  const open = new Set(printed.concat(draws.flatMap((draw) => draw.parts.flatMap((part) => part.options?.map((option) => option.text) ?? []))).flatMap((text) => text.match(/\d[\d.]*/g) ?? []));
  const keys = draws.flatMap((draw) => draw.parts).map((part) => /\d[\d.]*/.exec(part.key.text)?.[0] ?? '');
  return new Set(keys.filter((figure) => figure.replace('.', '').length >= 4 && figure.includes('.') && !open.has(figure)));
}

/** What the server alone knows of one candidate's paper. */
export async function secretsOf(candidateId: string): Promise<Secrets> {
  const rows = await database()
    .selectFrom('paper_key').innerJoin('template_version as v', 'v.id', 'paper_key.template_version_id').innerJoin('template as t', 't.id', 'v.template_id')
    .select(['paper_key.seed', 'paper_key.draw', 'v.text', 't.slug']).where('candidate_id', '=', candidateId).execute();
  const draws = rows.map((row) => row.draw as unknown as Draw);
  const words = new Set(rows.flatMap((row) => [row.seed, row.slug, ...textsOf(row.text)]));
  for (const part of draws.flatMap((draw) => draw.parts)) for (const text of [...full(part.key.value), ...part.missteps.flatMap((misstep) => full(misstep.value))]) words.add(text);
  return { words, figures: figuresOf(draws) };
}

/** Which secrets stand in what was heard, each with where. `own` are answers of the candidate, which come back to them. */
export function leaks(heard: readonly Heard[], secrets: Secrets, own: readonly string[] = []): string[] {
  const found = new Set<string>();
  for (const { url, text } of heard) {
    const plain = unescaped(text);
    for (const word of secrets.words) if (text.includes(word) || plain.includes(word)) found.add(`${word} in ${url}`);
    if (url.includes('/_next/static/')) continue;
    for (const figure of secrets.figures) {
      if (own.some((answer) => answer.startsWith(figure))) continue;
      if (new RegExp(`(?<![\\d.])${figure.replace('.', '\\.')}(?!\\d)`).test(plain)) found.add(`${figure} in ${url}`);
    }
  }
  return [...found];
}
