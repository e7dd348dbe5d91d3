import { refuse, type Result } from '@/lib/result';
import type { TemplateFacts } from './model';
import { runSandboxed, type SandboxRefusal } from './sandbox';
import type { Preview, Reading } from './sandbox-tasks';

const patience = 10_000;

/** What the text says of itself and what is wrong with it. Refused when reading it was stopped. */
export const readText = (text: string): Promise<Result<Reading, SandboxRefusal>> => runSandboxed({ kind: 'read', text }, { stall: patience });

/** The facts of a text that may not parse: null then, or when reading it was stopped. */
export async function factsOf(text: string): Promise<TemplateFacts | null> {
  const reading = await readText(text);
  return reading.ok ? reading.value.facts : null;
}

/** One draw of a text by seed, as an instructor sees it; nothing is stored. `locale` decides the decimal mark. */
export const drawText = (text: string, seed: string, locale: string): Promise<Result<Preview, SandboxRefusal>> =>
  runSandboxed({ kind: 'preview', text, seed, locale }, { stall: patience });

export type WholeReading = Reading & { facts: TemplateFacts };

/** What a text that must parse says of itself. */
export async function readWhole(text: string): Promise<Result<WholeReading>> {
  const reading = await readText(text);
  if (!reading.ok) return reading;
  const { facts, problems } = reading.value;
  const first = problems[0];
  if (!facts) return refuse('problems', `The text does not read: ${first ? `${first.line ? `line ${first.line}: ` : ''}${first.says}` : 'it is empty.'}`);
  return { ok: true, value: { ...reading.value, facts } };
}
