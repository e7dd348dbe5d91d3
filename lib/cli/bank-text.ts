import type { QuestionMarking } from '@/lib/marking/mark';
import type { CheckReport } from '@/lib/templates/check';
import type { Problem } from '@/lib/templates/problem';
import type { DrawReport } from '@/lib/templates/report';

const placeOf = ({ line, column }: Problem): string => (line === undefined ? '' : `:${line}${column === undefined ? '' : `:${column}`}`);

/** One problem on one line: place, code, part, text, and the seeds that show it. */
export function problemText(file: string, problem: Problem): string {
  const part = problem.part === undefined ? '' : ` part ${problem.part}`;
  const seeds = problem.seeds.length === 0 ? '' : ` (${problem.count} times; ${problem.seeds.join(', ')})`;
  return `${file}${placeOf(problem)} ${problem.code}${part}: ${problem.says}${seeds}`;
}

export function reportText(file: string, report: CheckReport): string {
  const head = `${report.ok ? 'in order' : 'problems'}  ${file}: ${report.draws} draws, ${report.distinct} different, ${report.redraws.mean} redraws on average`;
  const parts = Object.entries(report.parts).map(([part, { min, median, max }]) => `  part ${part}: ${min} to ${max}, median ${median}`);
  const excused = report.excused.map((problem) => `  given a reason: ${problemText(file, problem)}`);
  return [head, ...parts, ...report.problems.map((problem) => `  ${problemText(file, problem)}`), ...excused].join('\n');
}

export function drawText(draw: DrawReport): string {
  const given = Object.entries(draw.given).map(([name, { text }]) => `  ${name} = ${text}`);
  const parts = draw.parts.flatMap((part) => [
    `${part.part}) ${part.ask} [${part.marks}]`,
    ...(part.options ?? []).map(({ option, text, right }) => `   ${option}${right ? ' *' : '  '} ${text}`),
    `   key: ${part.key.text}${part.unit === undefined || part.options ? '' : ` ± ${Number(part.accept.tolerance.toPrecision(3))} ${part.unit}`}`,
    ...part.missteps.map(({ text, says, earns }) => `   misstep: ${text}: ${says}${earns > 0 ? ` (earns ${earns})` : ''}`),
  ]);
  return [`${draw.template}, seed ${draw.seed}, ${draw.redraws} redraws`, ...given, '', draw.stem, ...parts, '', draw.solution].join('\n');
}

export function markText(marking: QuestionMarking): string {
  const parts = marking.parts.map(({ part, awarded, of, verdict, reads, key, says }) =>
    `${part}) ${awarded} of ${of}, ${verdict}${reads === undefined ? '' : `, read as ${reads.text}`}, key ${key.text}. ${says}`);
  return [...parts, `${marking.awarded} of ${marking.of} marks`].join('\n');
}
