import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ImportPreview } from '@/components/people/ImportPreview';
import { EmptyState } from '@/components/ui/EmptyState';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import type { RosterTaken } from '@/lib/rosters/model';
import { readPreview } from '@/lib/rosters/queries';
import { drop, takeIn } from '../actions';

export const metadata: Metadata = { title: 'Preview of a roster' };

const counts = ({ people, added, changed, enrolled, invited }: RosterTaken): string =>
  `${people} ${people === 1 ? 'person' : 'people'}: ${added} new, ${changed} changed; ${enrolled} enrolled, ${invited} invited.`;

export default async function PreviewPage({ params }: { params: Promise<{ importId: string }> }) {
  const { importId } = await params;
  const context = await pageContext('registrar');
  const read = await readPreview(context, importId);
  if (!read.ok) notFound();
  const preview = read.value;
  const says = preview.state === 'previewed' ? `${preview.rows.length} rows for ${preview.term.name}. Nothing is taken in yet.` : undefined;
  return (
    <>
      <PageHead title={preview.fileName} says={says} back={{ href: '/people/import', label: 'Import a roster' }} />
      {preview.state === 'previewed' ? (
        <ImportPreview preview={preview} take={takeIn.bind(null, importId)} drop={drop.bind(null, importId)} />
      ) : (
        <EmptyState title={preview.state === 'taken' ? 'This roster was taken in' : 'This roster was dropped'} says={preview.taken ? `${counts(preview.taken)} Its rows are no longer kept here.` : 'Its rows are no longer kept here.'}>
          <LinkButton href="/people" look="main">
            Go to people
          </LinkButton>
        </EmptyState>
      )}
    </>
  );
}
