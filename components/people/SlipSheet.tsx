'use client';

import type { SlipBatch } from '@/components/people/MembersLedger';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';

/** Slips to print and cut, on A4 in two columns. The codes are on this page only: leaving it lets them go. */
export function SlipSheet({ school, batch, onDone }: { school: string; batch: SlipBatch; onDone: () => void }) {
  const where = typeof window === 'undefined' ? '' : window.location.host;
  return (
    <section aria-label="Slips" className="grid gap-4">
      <div className="grid gap-3 print:hidden">
        <Notice kind="wait" live title={`${batch.slips.length} ${batch.slips.length === 1 ? 'slip' : 'slips'} made.`}>
          <p>Print them now: the codes are shown once. Each works once; slips made earlier for these students no longer work.</p>
        </Notice>
        {batch.left.length > 0 && (
          <Notice kind="info" title="Left out:">
            <p>{batch.left.map((one) => `${one.name} (${one.why})`).join('; ')}.</p>
          </Notice>
        )}
        <div className="btn-row">
          {batch.slips.length > 0 && (
            <Button look="main" onClick={() => window.print()}>
              Print the slips
            </Button>
          )}
          <Button onClick={onDone}>Shut the slips</Button>
        </div>
      </div>
      <ul className="grid gap-4 sm:grid-cols-2 print:grid-cols-2 print:gap-0">
        {batch.slips.map((slip) => (
          <li key={slip.accountId} className="grid break-inside-avoid gap-1 border border-dashed border-rule-strong bg-sheet p-5 text-15">
            <span className="text-13 text-ink-soft">{school}</span>
            <span className="text-18 font-medium">{slip.name}</span>
            <dl className="grid grid-cols-[auto_1fr] items-baseline gap-x-3">
              <dt className="text-13 text-ink-soft">Learner number</dt>
              <dd className="font-mono">{slip.learnerNumber}</dd>
              <dt className="text-13 text-ink-soft">Code</dt>
              <dd className="font-mono text-18 font-semibold">{slip.code}</dd>
            </dl>
            <span className="text-13 text-ink-soft">
              {where}/slip. Works once, until {slip.until}. For you alone.
            </span>
          </li>
        ))}
      </ul>
    </section>
  );
}
