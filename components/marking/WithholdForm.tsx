'use client';

import { useState } from 'react';
import { useAct } from '@/components/sittings/plan/use-act';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { TextArea } from '@/components/ui/TextArea';
import type { Result } from '@/lib/result';
import type { WithholdInput } from '@/lib/results/model';

/** Withholds a result before it is released, or lifts that, with the reason. */
export function WithholdForm({ candidateId, withheld, withhold }: { candidateId: string; withheld: boolean; withhold: (input: WithholdInput) => Promise<Result<null>> }) {
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const { act, busy, said } = useAct();
  const verb = withheld ? 'Lift the withholding' : 'Withhold the result';
  const send = async () => {
    if (await act(() => withhold({ candidateId, withheld: !withheld, reason }), () => 'Done.')) {
      setOpen(false);
      setReason('');
    }
  };
  return (
    <>
      <Button onClick={() => setOpen(true)}>{verb}</Button>
      <Dialog open={open} onClose={() => setOpen(false)} title={`${verb}?`}>
        <p className="dialog__text">{withheld ? 'The result can then be released like the others.' : 'It stays behind when the others are released. Withholding is no finding: marks and outcome stay as they are.'}</p>
        <div className="mt-4"><TextArea label="Reason" help="It stands in the record." rows={2} maxLength={500} value={reason} onChange={(event) => setReason(event.target.value)} error={said?.kind === 'stop' ? said.text : undefined} /></div>
        <div className="dialog__do"><Button look={withheld ? 'main' : 'stop-main'} busy={busy} onClick={() => void send()}>{verb}</Button></div>
      </Dialog>
    </>
  );
}
