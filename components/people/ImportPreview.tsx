'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useState, useTransition } from 'react';
import { Button } from '@/components/ui/Button';
import { useConfirm } from '@/components/ui/Confirm';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn } from '@/components/ui/ledger/model';
import { Notice } from '@/components/ui/Notice';
import { Sign } from '@/components/ui/Sign';
import type { Result } from '@/lib/result';
import type { RosterPreview, RosterProblem, RosterTaken } from '@/lib/rosters/model';

type Props = { preview: RosterPreview; take: () => Promise<Result<RosterTaken>>; drop: () => Promise<Result<null>> };

const problemColumns: LedgerColumn[] = [
  { key: 'line', title: 'Line', figures: 0 },
  { key: 'column', title: 'Column', choose: true },
  { key: 'says', title: 'What is wrong' },
];
const rowColumns: LedgerColumn[] = [
  { key: 'name', title: 'Name' },
  { key: 'learnerNumber', title: 'Learner number' },
  { key: 'email', title: 'E-mail' },
  { key: 'class', title: 'Class', choose: true },
  { key: 'does', title: 'What happens' },
  { key: 'line', title: 'Line', figures: 0, rule: true },
  { key: 'state', title: 'Row', rule: true, choose: true },
];

function Problems({ problems }: { problems: readonly RosterProblem[] }) {
  const rows = useMemo(() => problems.map((one, place) => ({ id: String(place), cells: { line: one.line, column: one.column, says: one.says } })), [problems]);
  return <Ledger label="Problems" columns={problemColumns} rows={rows} empty={null} options={{ noun: { one: 'problem', many: 'problems' }, file: 'problems of the roster', sort: { key: 'line' } }} />;
}

function markOf(bad: boolean, changes: readonly string[], known: boolean) {
  if (bad) return { value: 'problem', show: <Sign shape="cross" tone="stop">problem</Sign> };
  if (!known) return { value: 'new', show: <Sign shape="sq-dashed" tone="info">new</Sign> };
  return changes.length > 0 ? { value: 'changes', show: <Sign shape="sq-half" tone="wait">changes</Sign> } : { value: 'no change', show: <Sign shape="check" tone="ok">no change</Sign> };
}

function Rows({ preview }: { preview: RosterPreview }) {
  const rows = useMemo(() => {
    const bad = new Set(preview.problems.map((one) => one.line));
    return preview.rows.map((row) => ({
      id: String(row.line),
      cells: {
        name: row.name,
        learnerNumber: row.learnerNumber,
        email: row.email,
        class: row.class,
        does: row.changes.join('; '),
        line: row.line,
        state: markOf(bad.has(row.line), row.changes, row.known !== null),
      },
    }));
  }, [preview]);
  return <Ledger label="Rows" columns={rowColumns} rows={rows} empty={null} options={{ noun: { one: 'row', many: 'rows' }, file: 'preview of the roster', sort: { key: 'line' } }} />;
}

/** What a roster would do, row by row; then all of it is taken in, or nothing. */
export function ImportPreview({ preview, take, drop }: Props) {
  const router = useRouter();
  const [ask, question] = useConfirm();
  const [busy, start] = useTransition();
  const [refused, setRefused] = useState<string | null>(null);
  const { rows, problems, newClasses } = preview;
  const takeIn = async () => {
    const says = `${rows.length} rows are taken in at once${preview.invite ? ', and new people with an e-mail are sent invitations' : ''}. Nothing is taken away from anybody.`;
    if (!(await ask({ title: `Take in ${preview.fileName}?`, says, verb: 'Take it in', look: 'main' }))) return;
    start(async () => {
      const result = await take().catch(() => null);
      // What was done is on the page itself, read anew.
      if (!result?.ok) setRefused(result?.says ?? 'The server did not answer. Look under People whether it was taken in before you try again.');
    });
  };
  return (
    <div className="grid gap-6">
      {problems.length > 0 ? (
        <Notice kind="stop" title={`${problems.length} ${problems.length === 1 ? 'thing is' : 'things are'} to be put right.`}>
          <p>Correct the file and read it again. Nothing was taken in.</p>
        </Notice>
      ) : (
        <Notice kind="ok" title="Every row can be taken in.">
          <p>Read as {preview.encoding}. Look the rows over, then take them in.</p>
        </Notice>
      )}
      {preview.unknown.length > 0 && (
        <Notice kind="info" title="Columns not read:">
          <p>{preview.unknown.join(', ')}.</p>
        </Notice>
      )}
      {newClasses.length > 0 && (
        <Notice kind="info" title={`Classes to be made in ${preview.term.name}:`}>
          <p>{newClasses.join(', ')}.</p>
        </Notice>
      )}
      {refused && (
        <Notice kind="stop" live>
          <p>{refused}</p>
        </Notice>
      )}
      <div className="btn-row">
        <Button look="main" busy={busy} disabled={problems.length > 0} onClick={() => void takeIn()}>
          Take in {rows.length} {rows.length === 1 ? 'row' : 'rows'}
        </Button>
        <Button disabled={busy} onClick={() => start(async () => (await drop(), router.push('/people/import')))}>
          Drop this file
        </Button>
      </div>
      {problems.length > 0 && <Problems problems={problems} />}
      <Rows preview={preview} />
      {question}
    </div>
  );
}
