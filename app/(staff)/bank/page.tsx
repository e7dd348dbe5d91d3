import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { BankLedger } from '@/components/bank/BankLedger';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { areaTitles } from '@/lib/bank/areas';
import { ledgerRows } from '@/lib/bank/queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';

export const metadata: Metadata = { title: 'Bank' };

export default async function BankPage() {
  const context = await pageContext('instructor');
  const rows = await ledgerRows(context);
  if (!rows.ok) notFound();
  const { settings } = await readSchool(context.db);
  return (
    <>
      <PageHead title="Bank" says="Every question the school examines with: written once with formulas, proved over thousands of draws, approved by a second instructor.">
        <LinkButton href="/bank/files">Bring in files</LinkButton>
        <LinkButton href="/bank/new" look="main">
          New template
        </LinkButton>
      </PageHead>
      <BankLedger rows={rows.value} areas={areaTitles()} moment={(time) => showMoment(time, settings)} />
    </>
  );
}
