import { readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { z } from 'zod';
import { loadLibrary } from '@/lib/bank/library';
import { markQuestion } from '@/lib/marking/mark';
import { type CheckReport, checkTemplate, defaultDraws } from '@/lib/templates/check';
import { drawTemplate } from '@/lib/templates/draw';
import { parseTemplate } from '@/lib/templates/parse';
import type { Template } from '@/lib/templates/plan';
import type { Problem } from '@/lib/templates/problem';
import { reportDraw } from '@/lib/templates/report';
import { drawText, markText, problemText, reportText } from './bank-text';

const exitStatus = { inOrder: 0, problems: 1, unusable: 2, crash: 3 } as const;

const usage = `Use:
  npm run bank -- check FILE… [--draws ${defaultDraws}] [--json]
  npm run bank -- draw FILE --seed S [--locale L] [--json]
  npm run bank -- mark FILE --seed S --answers ANSWERS.json [--locale L] [--json]`;

/** Input that cannot be used: a file that cannot be read, a word or option that is missing. */
class Unusable extends Error {}

const readFile = (file: string): string => {
  try {
    return readFileSync(file, 'utf8');
  } catch (error) {
    throw new Unusable(`${file} cannot be read: ${error instanceof Error ? error.message : String(error)}`);
  }
};

const print = (text: string): void => {
  process.stdout.write(`${text}\n`);
};
const printJson = (value: unknown): void => print(JSON.stringify(value, null, 2));

const library = () => loadLibrary(fileURLToPath(new URL('../../question-templates', import.meta.url)));

/** The report of a text that could not be read as a template: nothing was drawn. */
const unreadReport = (file: string, problems: Problem[]): CheckReport => ({
  template: path.basename(file).replace(/\.ya?ml$/, ''), ok: false, draws: 0, distinct: 0, redraws: { mean: 0, max: 0 }, parts: {}, bins: {}, problems, excused: [],
});

function check(files: string[], draws: number, json: boolean): number {
  const rows = library();
  const reports = files.map((file) => {
    const parsed = parseTemplate(readFile(file), rows);
    const report = parsed.ok ? checkTemplate(parsed.template, { draws }) : unreadReport(file, parsed.problems);
    if (!json) print(reportText(file, report));
    return report;
  });
  if (json) printJson(reports.map(({ bins: _, excused: __, ...report }) => report));
  return reports.every(({ ok }) => ok) ? exitStatus.inOrder : exitStatus.problems;
}

/** The template of a file; its problems are printed where it has any. */
function templateIn(file: string, json: boolean): Template | null {
  const parsed = parseTemplate(readFile(file), library());
  if (parsed.ok) return parsed.template;
  if (json) printJson({ ok: false, problems: parsed.problems });
  else for (const problem of parsed.problems) print(problemText(file, problem));
  return null;
}

const localeOf = (locale: string | undefined): string => {
  if (locale === undefined) return 'en';
  try {
    return Intl.getCanonicalLocales(locale)[0] ?? 'en';
  } catch {
    throw new Unusable(`"${locale}" is no locale: use one such as en-CA or fr-CA.`);
  }
};

const refused = (says: string, code: string, json: boolean): number => {
  if (json) printJson({ ok: false, problems: [{ code, count: 1, share: 1, seeds: [], says }] });
  else print(says);
  return exitStatus.problems;
};

function draw(file: string, seed: string, locale: string, json: boolean): number {
  const template = templateIn(file, json);
  if (template === null) return exitStatus.problems;
  const drawn = drawTemplate(template, seed, { locale });
  if (!drawn.ok) return refused(drawn.says, drawn.code, json);
  const report = reportDraw(template, drawn.value);
  if (json) printJson(report);
  else print(drawText(report));
  return exitStatus.inOrder;
}

const answersSchema = z.record(z.string(), z.string());

const answersIn = (file: string): Record<string, string> => {
  const text = readFile(file);
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw new Unusable(`${file} is not JSON.`);
  }
  const answers = answersSchema.safeParse(value);
  if (!answers.success) throw new Unusable(`${file} must be an object of texts by part, such as { "a": "77.6 A", "b": "" }.`);
  return answers.data;
};

function mark(file: string, seed: string, answersFile: string, locale: string, json: boolean): number {
  const answers = answersIn(answersFile);
  const template = templateIn(file, json);
  if (template === null) return exitStatus.problems;
  const drawn = drawTemplate(template, seed, { locale });
  if (!drawn.ok) return refused(drawn.says, drawn.code, json);
  const marking = markQuestion(template, drawn.value, answers);
  if (json) printJson(marking);
  else print(markText(marking));
  return exitStatus.inOrder;
}

const options = {
  draws: { type: 'string' }, json: { type: 'boolean', default: false }, seed: { type: 'string' }, locale: { type: 'string' }, answers: { type: 'string' },
} as const;

const argumentsOf = (args: string[]) => {
  try {
    return parseArgs({ args, options, allowPositionals: true });
  } catch (error) {
    throw new Unusable(`${error instanceof Error ? error.message : String(error)}\n${usage}`);
  }
};

const needed = (value: string | undefined, name: string): string => {
  if (value === undefined || value === '') throw new Unusable(`--${name} is missing.\n${usage}`);
  return value;
};

const drawsOf = (text: string | undefined): number => {
  const draws = text === undefined ? defaultDraws : Number(text);
  if (!Number.isInteger(draws) || draws < 1 || draws > 1_000_000) throw new Unusable('--draws is a whole number from 1 to 1,000,000.');
  return draws;
};

/** Runs one command; answers with its exit status. */
function run(args: string[]): number {
  const { values, positionals: [command, ...files] } = argumentsOf(args);
  const [file, more] = files;
  if (command === undefined || file === undefined) throw new Unusable(usage);
  if (command === 'check') return check(files, drawsOf(values.draws), values.json);
  if (more !== undefined) throw new Unusable(`${command} takes one file.\n${usage}`);
  if (command === 'draw') return draw(file, needed(values.seed, 'seed'), localeOf(values.locale), values.json);
  if (command === 'mark') return mark(file, needed(values.seed, 'seed'), needed(values.answers, 'answers'), localeOf(values.locale), values.json);
  throw new Unusable(`There is no command ${command}.\n${usage}`);
}

try {
  process.exitCode = run(process.argv.slice(2));
} catch (error) {
  const unusable = error instanceof Unusable;
  process.stderr.write(`${unusable ? error.message : error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
  process.exitCode = unusable ? exitStatus.unusable : exitStatus.crash;
}
