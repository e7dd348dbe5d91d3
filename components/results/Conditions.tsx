import { Shape } from '@/components/ui/Shape';
import type { Condition } from '@/lib/results/rules';

/** What stands in the way of a step, then what is in order. */
export function Conditions({ conditions }: { conditions: readonly Condition[] }) {
  const ordered = [...conditions].sort((a, b) => Number(b.open) - Number(a.open));
  return (
    <ul>
      {ordered.map((condition) => (
        <li key={condition.code} className="flex items-baseline gap-2 border-b border-rule py-2 text-15">
          <span className={condition.open ? 'text-brass' : 'text-enamel'}><Shape name={condition.open ? 'sq-bang' : 'check'} /></span>
          <span><span className="vh">{condition.open ? 'Open: ' : 'In order: '}</span>{condition.says}</span>
        </li>
      ))}
    </ul>
  );
}
