import type { Block, Run } from './blocks';

const signs: Record<string, string> = {
  times: '×', cdot: '·', div: '÷', pm: '±', mp: '∓', approx: '≈', neq: '≠', ne: '≠', le: '≤', leq: '≤', ge: '≥', geq: '≥', propto: '∝', infty: '∞', to: '→',
  rightarrow: '→', Rightarrow: '⇒', parallel: '∥', angle: '∠', degree: '°', circ: '°', sqrt: '√', quad: '  ', qquad: '   ', ldots: '…', dots: '…', colon: ':',
  alpha: 'α', beta: 'β', gamma: 'γ', delta: 'δ', Delta: 'Δ', eta: 'η', theta: 'θ', lambda: 'λ', mu: 'µ', pi: 'π', rho: 'ρ', sigma: 'σ', tau: 'τ', phi: 'φ',
  varphi: 'φ', Phi: 'Φ', psi: 'ψ', omega: 'ω', Omega: 'Ω',
};
/** Commands that only change how their argument looks. */
const dressing = new Set(['text', 'mathrm', 'mathit', 'mathbf', 'operatorname', 'left', 'right', 'displaystyle', 'textstyle', 'tfrac', 'dfrac', 'frac', 'boxed']);

interface Reader { tex: string; at: number }

/** One argument: a group in braces, a command, or one sign. */
function argument(reader: Reader): string {
  while (reader.tex[reader.at] === ' ') reader.at += 1;
  if (reader.tex[reader.at] === '{') {
    reader.at += 1;
    const inner = sequence(reader, '}');
    reader.at += 1;
    return inner;
  }
  return piece(reader);
}

const bracketed = (text: string): string => (/[\s+−×·/-]/.test(text.trim()) ? `(${text.trim()})` : text.trim());

function command(reader: Reader): string {
  const name = /^\\([A-Za-z]+|.)/.exec(reader.tex.slice(reader.at, reader.at + 40))?.[1] ?? '';
  reader.at += name.length + 1;
  if (name === 'frac' || name === 'dfrac' || name === 'tfrac') {
    const over = argument(reader);
    return `${bracketed(over)}/${bracketed(argument(reader))}`;
  }
  if (name === 'sqrt') return `√${bracketed(argument(reader))}`;
  if (dressing.has(name)) return '';
  if (/^[A-Za-z]/.test(name)) return signs[name] ?? name;
  return name === ',' || name === ' ' || name === ';' || name === ':' ? ' ' : name === '!' ? '' : name;
}

function piece(reader: Reader): string {
  const sign = reader.tex[reader.at] ?? '';
  if (sign === '\\') return command(reader);
  if (sign === '{') return argument(reader);
  reader.at += 1;
  if (sign === '^') return raised(argument(reader));
  if (sign === '_') return `_${argument(reader)}`;
  return sign === '-' ? '−' : sign === '~' ? ' ' : sign;
}

const raised = (text: string): string => (text === '2' ? '²' : text === '3' ? '³' : text === '°' ? '°' : `^${bracketed(text)}`);

function sequence(reader: Reader, end: string): string {
  let text = '';
  while (reader.at < reader.tex.length && reader.tex[reader.at] !== end) text += piece(reader);
  return text;
}

/** A formula as one line of text, for places that cannot set mathematics: fractions with a stroke, indices after _. */
export const texToText = (tex: string): string => sequence({ tex, at: 0 }, '').replace(/[ \t\n]+/g, ' ').trim();

const runText = (run: Run): string => (run.type === 'text' ? run.text : run.type === 'break' ? '\n' : texToText(run.tex));
const lineText = (runs: readonly Run[]): string => runs.map(runText).join('');

/** The tree as plain text: for mail, a screen reader's summary, or a search. */
export const blocksText = (blocks: readonly Block[]): string =>
  blocks.map((block) => {
    if (block.type === 'paragraph') return lineText(block.runs);
    if (block.type === 'table') return [block.head, ...block.rows].map((row) => row.map(lineText).join('  |  ')).join('\n');
    return block.items.map((item, index) => `${block.ordered ? `${index + 1}.` : '•'} ${blocksText(item)}`).join('\n');
  }).join('\n\n');
