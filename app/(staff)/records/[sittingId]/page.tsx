import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { ActionButton } from '@/components/forms/ActionButton';
import { Conditions } from '@/components/results/Conditions';
import { recordColumns, recordRow, recordTotal } from '@/components/results/records-rows';
import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { BulkAction } from '@/components/ui/ledger/model';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { type RecordPage, recordPage } from '@/lib/results/records-queries';
import { decimalsFor, showOf } from '@/lib/results/show';
import { readSchool } from '@/lib/school/queries';
import { showDate } from '@/lib/school/times';
import { issueReportsAction, sealAction, sendAgainAction, sendReportsAction } from '../actions';

type Props = { params: Promise<{ sittingId: string }> };

const load = cache(async (sittingId: string) => {
  const context = await pageContext('registrar', 'instructor');
  const page = await recordPage(context, sittingId);
  if (!page.ok) notFound();
  return { context, page: page.value };
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: `Results, ${(await load((await params).sittingId)).page.title}` };
}

const results = (count: number): string => (count === 1 ? '1 result' : `${count} results`);

const bulkOf = (page: RecordPage): BulkAction[] => [
  { label: 'Issue grade reports', run: issueReportsAction.bind(null, page.id, false) },
  {
    label: 'Issue again', run: issueReportsAction.bind(null, page.id, true),
    confirm: { title: 'Issue these reports again?', says: 'Each gets a further issue that supersedes the one before. Both are kept.', verb: 'Issue again', look: 'main' },
  },
  {
    label: 'Send by e-mail', run: sendReportsAction.bind(null, page.id),
    confirm: { title: 'Send the grade reports by e-mail?', says: 'Each goes to the student’s own address, once an issue. No marks stand in the subject or the text.', verb: 'Send', look: 'main' },
  },
];

function Gate({ page }: { page: RecordPage }) {
  const open = page.conditions.filter((condition) => condition.open).length;
  const sealed = page.facts.states.sealed + page.facts.states.amended;
  const done = page.facts.candidates > 0 && sealed === page.facts.candidates;
  return (
    <section className="sheet sheet--pad" aria-labelledby="gate-head">
      <h2 id="gate-head" className="text-18">{done ? 'Sealed' : 'What stands in the way of sealing'}</h2>
      <p className="mb-3 text-15 text-ink-soft">{done ? 'No mark of this sitting changes any more.' : open === 0 ? 'Nothing.' : `${open} of ${page.conditions.length} conditions are open.`}</p>
      {!done && <Conditions conditions={page.conditions} />}
      {!done && open === 0 && page.keeps && (
        <div className="mt-4">
          <ActionButton
            label={`Seal ${results(page.facts.states.released)}`} look="main" run={sealAction.bind(null, page.id)}
            confirm={{ title: `Seal ${results(page.facts.states.released)}?`, says: 'No mark can be changed after this. Grade reports are issued from sealed results.', verb: 'Seal', keep: 'Not yet', look: 'main' }}
          />
        </div>
      )}
    </section>
  );
}

export default async function RecordSittingPage({ params }: Props) {
  const { context, page } = await load((await params).sittingId);
  const { settings } = await readSchool(context.db);
  const decimals = decimalsFor(page.lines.flatMap(({ result }) => (result ? [result.total, ...result.sections.map((section) => section.awarded)] : [])), settings);
  const again = page.keeps ? sendAgainAction : null;
  const says = `${page.exam} · ${page.title} · sat ${showDate(page.startsAt, settings)} in room ${page.room} · pass at ${showOf(page.passPercent, settings)} %`;
  return (
    <>
      <PageHead title={`Results, class ${page.className}`} says={says} back={{ href: '/records', label: 'Records' }} />
      <div className="beside">
        <div className="min-w-0">
          <Ledger
            label="Results" columns={recordColumns(page, decimals)} rows={page.lines.map((line) => recordRow(line, page.sections.length, again))}
            empty={<EmptyState title="No candidate" says="Nobody was on the list of this sitting." />}
            bulk={page.keeps ? bulkOf(page) : undefined}
            options={{ noun: { one: 'candidate', many: 'candidates' }, find: 'Find a name or number', file: `results-${page.className}`, total: recordTotal(page, decimals) }}
          />
        </div>
        <Gate page={page} />
      </div>
    </>
  );
}
