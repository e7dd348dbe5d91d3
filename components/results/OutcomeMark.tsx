import { StateMark } from '@/components/ui/StateMark';
import type { Outcome, ResultState } from '@/lib/results/model';

/** A result's outcome; one that is withheld has none to show. */
export function OutcomeMark({ outcome, withheld, small }: { outcome: Outcome; withheld: boolean; small?: boolean }) {
  return <StateMark thing="outcome" state={withheld ? 'withheld' : outcome} small={small} />;
}

export function ResultMark({ state, withheld, small }: { state: ResultState; withheld: boolean; small?: boolean }) {
  return <StateMark thing="result" state={withheld ? 'withheld' : state} small={small} />;
}
