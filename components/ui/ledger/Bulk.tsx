'use client';

import { useState, useTransition } from 'react';
import { Button } from '../Button';
import { useConfirm } from '../Confirm';
import { Notice } from '../Notice';
import type { BulkAction } from './model';
import type { LedgerTable } from './use-ledger';

/** The bar over a selection. Only selected rows that the filter still shows are acted on. */
export function Bulk({ table, actions }: { table: LedgerTable; actions: readonly BulkAction[] }) {
  const [ask, question] = useConfirm();
  const [says, setSays] = useState<{ kind: 'ok' | 'stop'; text: string } | null>(null);
  const [busy, start] = useTransition();
  const ids = table.getFilteredSelectedRowModel().rows.map((row) => row.id);
  const act = async (action: BulkAction) => {
    if (action.confirm && !(await ask(action.confirm))) return;
    start(async () => {
      const outcome = await action.run(ids);
      if (outcome?.says) setSays({ kind: outcome.ok ? 'ok' : 'stop', text: outcome.says });
      if (!outcome || outcome.ok) table.resetRowSelection(true);
    });
  };
  return (
    <>
      {says && (
        <div style={{ marginBottom: 12 }}>
          <Notice kind={says.kind} live action={<Button look="quiet" size="dense" onClick={() => setSays(null)}>Close</Button>}>
            {says.text}
          </Notice>
        </div>
      )}
      {ids.length > 0 && (
        <div className="ledger-bulk" role="region" aria-label="Selected rows">
          <span className="grow" role="status">
            {ids.length} selected
          </span>
          {actions.map((action) => (
            <Button key={action.label} size="dense" look={action.look ?? 'plain'} busy={busy} onClick={() => void act(action)}>
              {action.label}
            </Button>
          ))}
          <Button size="dense" look="quiet" onClick={() => table.resetRowSelection(true)}>
            Clear
          </Button>
        </div>
      )}
      {question}
    </>
  );
}
