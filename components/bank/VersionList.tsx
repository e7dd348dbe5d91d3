'use client';

import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { Notice } from '@/components/ui/Notice';
import { StateMark } from '@/components/ui/StateMark';
import { bankKeys, fetchVersion } from '@/lib/bank/client';
import type { VersionLine } from '@/lib/bank/views';

/** What became of a version, in words. */
function fateOf(version: VersionLine): string {
  const by = version.decidedBy ? ` by ${version.decidedBy}, ${version.decidedAt ?? ''}` : '';
  if (version.verdict === null) return `in review, asked for by ${version.askedBy}`;
  if (version.verdict === 'approved') return `approved${by}${version.retiredAt ? `; retired ${version.retiredAt}` : ''}`;
  return `${version.verdict}${by}`;
}

function stateOf(version: VersionLine): 'in review' | 'approved' | 'draft' | 'retired' {
  if (version.verdict === null) return 'in review';
  if (version.verdict !== 'approved') return 'draft';
  return version.retiredAt ? 'retired' : 'approved';
}

function VersionText({ id, onUse }: { id: string; onUse?: (text: string) => void }) {
  const { data, error, isPending } = useQuery({ queryKey: bankKeys.version(id), queryFn: ({ signal }) => fetchVersion(id, signal), staleTime: Infinity });
  if (isPending) return <p role="status">Fetching the text…</p>;
  if (error || !data) return <Notice kind="stop" live>{error?.message ?? 'The text could not be fetched.'}</Notice>;
  return (
    <div className="grid gap-4">
      <pre className="max-h-96 overflow-auto border border-rule bg-sheet p-3 font-mono text-13" tabIndex={0} aria-label={`Text of version ${data.number}`}>{data.text}</pre>
      {onUse && (
        <div className="btn-row">
          <Button onClick={() => onUse(data.text)}>Put this text into the editor</Button>
        </div>
      )}
    </div>
  );
}

/** Every version of a template, newest first, with what became of it; its text opens in a sheet. */
export function VersionList({ versions, onUse }: { versions: readonly VersionLine[]; onUse?: (text: string) => void }) {
  const [open, setOpen] = useState<VersionLine | null>(null);
  if (versions.length === 0) return <p className="text-15 text-ink-soft">No version yet. Asking for a review makes one that cannot change any more.</p>;
  return (
    <>
      <ul className="grid">
        {versions.map((version) => (
          <li key={version.id} className="grid gap-1 border-b border-rule py-3 text-15">
            <div className="flex items-center justify-between gap-3">
              <span className="font-medium">Version {version.number}</span>
              <StateMark thing="template" state={stateOf(version)} small>{version.verdict ?? 'in review'}</StateMark>
            </div>
            <p className="text-13 text-ink-soft">
              Text by {version.author}, {version.madeAt}; {fateOf(version)}. On {version.forms === 1 ? '1 form' : `${version.forms} forms`}.
            </p>
            {version.note && <p className="text-13">{version.note}</p>}
            <div><Button size="dense" look="quiet" onClick={() => setOpen(version)}>Show its text</Button></div>
          </li>
        ))}
      </ul>
      <Dialog open={open !== null} onClose={() => setOpen(null)} title={`Version ${open?.number ?? ''}`} wide>
        {open && <VersionText id={open.id} onUse={onUse && ((text) => (onUse(text), setOpen(null)))} />}
      </Dialog>
    </>
  );
}
