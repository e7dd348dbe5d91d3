import { readFileSync } from 'node:fs';
import { afterAll, describe, expect, it } from 'vitest';
import { closeSandbox, runSandboxed } from '@/lib/bank/sandbox';

const text = readFileSync('question-templates/dc-motors/shunt-weakened-field.yaml', 'utf8');
afterAll(closeSandbox);

describe('the reading process', { timeout: 180_000 }, () => {
  it('reads and draws, without the secrets of its parent', async () => {
    const preview = await runSandboxed({ kind: 'preview', text, seed: 'check-3', locale: 'en-CA' }, { stall: 60_000 });
    expect(preview).toMatchObject({ ok: true, value: { facts: { slug: 'shunt-weakened-field', marks: 6, kinds: ['number', 'number', 'number'] }, problems: [], draw: { seed: 'check-3' } } });
    if (!preview.ok || !preview.value.draw) throw new Error('There is no draw.');
    // What a candidate sees stands apart from what only an instructor sees.
    const { question, parts, solutionHtml } = preview.value.draw;
    expect(parts.map(({ part }) => part)).toEqual(['a', 'b', 'c']);
    expect(solutionHtml).toContain('katex');
    for (const hidden of ['speed taken as proportional', 'n1 *', 'check-3', parts[2]?.key ?? '']) expect(JSON.stringify(question)).not.toContain(hidden);
  });

  it('is killed when it stalls or is told to, and the next task finds a new one', async () => {
    const stopped = await runSandboxed({ kind: 'check', text, draws: 1_000_000_000 }, { stall: 1 });
    expect(stopped).toMatchObject({ ok: false, code: 'stopped' });
    const cancel = new AbortController();
    const heard: number[] = [];
    const cancelled = await runSandboxed({ kind: 'check', text, draws: 1_000_000_000 }, {
      stall: 60_000, signal: cancel.signal, onProgress: (done) => (heard.push(done), cancel.abort()),
    });
    expect(cancelled).toMatchObject({ ok: false, code: 'cancelled' });
    expect(heard.length).toBeGreaterThan(0);
    expect(await runSandboxed({ kind: 'read', text: 'template: [' }, { stall: 60_000 })).toMatchObject({ ok: true, value: { facts: null, problems: [{ code: 'schema', line: 1 }] } });
  });
});
