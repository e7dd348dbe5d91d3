import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';

const folder = mkdtempSync(path.join(tmpdir(), 'fullfield-bank-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const file = (name: string, text: string): string => {
  const full = path.join(folder, name);
  writeFileSync(full, text);
  return full;
};
const bank = (...args: string[]): { status: number | null; stdout: string; stderr: string } =>
  spawnSync(process.execPath, ['--import', 'tsx', 'lib/cli/bank.ts', ...args], { encoding: 'utf8' });
const sample = 'question-templates/dc-motors/shunt-weakened-field.yaml';

describe('npm run bank', () => {
  it('checks several files: an array, one a template, and status 1 where one has problems', { timeout: 120_000 }, () => {
    const broken = file('broken.yaml', 'template: broken\nlanguage: 1\n');
    const { status, stdout } = bank('check', sample, broken, '--draws', '60', '--json');
    expect(status).toBe(1);
    const reports = JSON.parse(stdout) as { template: string; ok: boolean; problems: { code: string; line: number }[] }[];
    expect(reports.map(({ template, ok }) => [template, ok])).toEqual([['shunt-weakened-field', true], ['broken', false]]);
    expect(reports[1]?.problems.every(({ code, line }) => code === 'schema' && line >= 1)).toBe(true);
    expect(Object.keys(reports[0] ?? {}).sort()).toEqual(['distinct', 'draws', 'ok', 'parts', 'problems', 'redraws', 'template']);
  });

  it('draws by seed and marks what was answered to that draw', { timeout: 120_000 }, () => {
    const drawn = bank('draw', sample, '--seed', 'check-0', '--json');
    expect(drawn.status).toBe(0);
    const draw = JSON.parse(drawn.stdout) as { given: { V: { value: number } }; parts: { part: string; key: { value: number; text: string } }[] };
    const answers = file('answers.json', JSON.stringify(Object.fromEntries(draw.parts.map(({ part, key }) => [part, part === 'b' ? '' : key.text]))));
    const marked = bank('mark', sample, '--seed', 'check-0', '--answers', answers, '--json');
    expect(marked.status).toBe(0);
    expect(JSON.parse(marked.stdout)).toMatchObject({ awarded: 4, of: 6, parts: [{ verdict: 'correct' }, { verdict: 'blank', awarded: 0 }, { verdict: 'correct' }] });
  });

  it('answers 2 to input that cannot be used, and says what is wrong', { timeout: 120_000 }, () => {
    for (const args of [['check', path.join(folder, 'nowhere.yaml')], ['mark', sample, '--seed', 'x', '--answers', file('bad.json', '[1]')]]) {
      const { status, stderr } = bank(...args);
      expect([args.join(' '), status]).toEqual([args.join(' '), 2]);
      expect(stderr.length).toBeGreaterThan(10);
    }
  });
});
