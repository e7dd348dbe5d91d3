import type { Value } from '@/lib/expressions/compile';
import type { Draw } from './draw';
import type { Scope } from './kinds/kind';

/** The scope of a stored draw: its values, and its keys as earlier parts. */
export function scopeOf(draw: Draw): Scope {
  const values: Record<string, Value> = {};
  const parts: Record<string, Value> = {};
  for (const [name, { value }] of Object.entries(draw.given)) values[name] = value;
  for (const [name, { value }] of Object.entries(draw.derived)) values[name] = value;
  for (const { part, carries } of draw.parts) if (carries !== undefined) parts[part] = carries;
  return { values, parts };
}
