import { readFileSync } from 'node:fs';
import { loadLibrary } from '@/lib/bank/library';
import { streamOf } from '@/lib/numeric/stream';
import { parseTemplate } from '@/lib/templates/parse';
import { addKeys, drawValues } from '@/lib/templates/values';

/** Draws with keys a second, by the engine and by a plain function; `ratio` is the time of the first over the second. */
export interface DrawMeasure { draws: number; engine: number; plain: number; ratio: number }

const e24 = [150, 160, 180, 200, 220, 240, 270, 300];
const voltages = [230, 240, 250, 500];
const speeds = [850, 1150, 1750];

/** The formulas of shunt-weakened-field written out by hand, over the same streams: what no engine could do without. */
function plainDraw(seed: string): number[] {
  for (let redraw = 0; redraw <= 500; redraw += 1) {
    const place = (name: string, count: number) => Math.floor(streamOf(seed, name, redraw)() * count);
    const V = voltages[place('V', 4)] ?? 0;
    const Ra = (15 + place('Ra', 31)) / 100;
    const IL = 40 + place('IL', 51);
    const Rf = e24[place('Rf', e24.length)] ?? 0;
    const n1 = speeds[place('n1', 3)] ?? 0;
    const w = 70 + place('w', 16);
    const If = V / Rf;
    const Ia1 = IL - If;
    const E1 = V - Ia1 * Ra;
    const Ia2 = Ia1 / (w / 100);
    const E2 = V - Ia2 * Ra;
    const holds = Ia1 > 0.8 * IL && E1 > 0.85 * V && E2 > 0.85 * V && V - E1 > 0.015 * V && E1 - E2 > 0.012 * E1 && If < 0.06 * IL;
    if (!holds) continue;
    const a = IL - V / Rf;
    const b = V - a * Ra;
    return [a, b, (n1 * (V - (a / (w / 100)) * Ra)) / b / (w / 100)];
  }
  return [];
}

/** Time of the processor [s]: other programs of the machine do not count. */
const seconds = (work: () => void): number => {
  const before = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6;
};

/**
 * Measures draw and key of one template against the plain function, in turns so that both meet the same machine; the
 * fastest turn of each counts. Throws where the two disagree.
 */
export function measureDraw(draws = 2000, turns = 7): DrawMeasure {
  const parsed = parseTemplate(readFileSync('question-templates/dc-motors/shunt-weakened-field.yaml', 'utf8'), loadLibrary());
  if (!parsed.ok) throw new Error(parsed.problems.map(({ says }) => says).join('\n'));
  const { template } = parsed;
  const engineDraw = (seed: string): number[] => {
    const drawn = drawValues(template, seed);
    if (!drawn.ok) throw new Error(drawn.says);
    addKeys(template.plan, drawn.value.scope);
    return Object.values(drawn.value.scope.parts).map(Number);
  };
  for (let index = 0; index < 200; index += 1) {
    const [engine, plain] = [engineDraw(`bench-${index}`), plainDraw(`bench-${index}`)];
    if (engine.length !== plain.length || engine.some((key, part) => Math.abs(key - (plain[part] ?? NaN)) > 1e-9 * Math.abs(key)))
      throw new Error(`The plain function and the engine differ for bench-${index}: ${plain.join(', ')} and ${engine.join(', ')}.`);
  }
  let [engine, plain] = [Infinity, Infinity];
  for (let turn = 0; turn < turns; turn += 1) {
    const run = (draw: (seed: string) => number[]) => seconds(() => {
      for (let index = 0; index < draws; index += 1) draw(`bench-${index}`);
    });
    plain = Math.min(plain, run(plainDraw));
    engine = Math.min(engine, run(engineDraw));
  }
  return { draws, engine: draws / engine, plain: draws / plain, ratio: engine / plain };
}
