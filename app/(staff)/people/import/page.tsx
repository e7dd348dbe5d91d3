import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ImportForm } from '@/components/people/ImportForm';
import { PeopleTabs } from '@/components/people/PeopleTabs';
import { RosterColumns } from '@/components/people/RosterColumns';
import { EmptyState } from '@/components/ui/EmptyState';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { listTerms } from '@/lib/classes/queries';
import { preview } from './actions';

export const metadata: Metadata = { title: 'Import a roster' };

export default async function ImportPage() {
  const context = await pageContext('registrar');
  const terms = await listTerms(context);
  if (!terms.ok) notFound();
  const open = terms.value.filter((term) => term.state === 'open');
  return (
    <>
      <PageHead title="Import a roster" says="People, classes and accommodations from a spreadsheet: looked over first, then all of it or nothing." />
      <PeopleTabs />
      {open.length === 0 ? (
        <EmptyState title="No term is open" says="A roster belongs to a term.">
          <LinkButton href="/people/terms" look="main">
            Make a term first
          </LinkButton>
        </EmptyState>
      ) : (
        <div className="grid items-start gap-10 lg:grid-cols-[minmax(0,1fr)_minmax(0,1.4fr)]">
          <ImportForm terms={open} preview={preview} />
          <section aria-labelledby="columns" className="grid gap-3">
            <h2 id="columns" className="text-22">Columns</h2>
            <p className="text-15 text-ink-soft">A name, and a learner number or an e-mail; everything else may be missing. Commas, semicolons and tabs are read, UTF-8 and Windows code page alike. People known by learner number or e-mail are changed, not doubled.</p>
            <RosterColumns />
          </section>
        </div>
      )}
    </>
  );
}
