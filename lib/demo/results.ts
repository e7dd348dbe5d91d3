import type { Company } from './people';
import type { Stage } from './stage';

/** Marks the sitting that is over. */
export async function publish({ say }: Stage, _company: Company, _sittingId: string): Promise<void> {
  say('  marked');
}
