import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { ActionButton } from '@/components/forms/ActionButton';
import { CandidatesLedger } from '@/components/marking/CandidatesLedger';
import { ClaimsPanel } from '@/components/marking/ClaimsPanel';
import { ItemsLedger } from '@/components/marking/ItemsLedger';
import { Conditions } from '@/components/results/Conditions';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { type MarkingPage, markingPage } from '@/lib/results/marking-queries';
import { decimalsFor } from '@/lib/results/show';
import { readSchool } from '@/lib/school/queries';
import { showDate, showSecond } from '@/lib/school/times';
import { decideClaimAction, moderateAction, releaseAction } from '../actions';

type Props = { params: Promise<{ sittingId: string }> };

const load = cache(async (sittingId: string) => {
  const context = await pageContext('instructor');
  const page = await markingPage(context, sittingId);
  if (!page.ok) notFound();
  return { context, page: page.value };
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: `Marking, ${(await load((await params).sittingId)).page.title}` };
}

function Steps({ page }: { page: MarkingPage }) {
  const { states, withheld } = page.facts;
  const waiting = page.conditions.some((condition) => condition.open && condition.code !== 'moderation');
  const toRelease = states.moderated - withheld;
  return (
    <>
      <LinkButton href={`/records/${page.id}`}>Go to the results</LinkButton>
      {states.provisional > 0 && !waiting && <ActionButton label="Moderate" look="main" run={moderateAction.bind(null, page.id)} />}
      {states.provisional === 0 && toRelease > 0 && !waiting && (
        <ActionButton
          label="Release results" look="main" run={releaseAction.bind(null, page.id)}
          confirm={{
            title: `Release ${toRelease === 1 ? '1 result' : `${toRelease} results`} of “${page.title}”?`, verb: 'Release results', keep: 'Not yet', look: 'main',
            says: 'From now on each student sees the own marked paper with keys and solutions. This cannot be taken back.',
          }}
        />
      )}
    </>
  );
}

export default async function MarkingSittingPage({ params }: Props) {
  const { context, page } = await load((await params).sittingId);
  const { settings } = await readSchool(context.db);
  const decimals = decimalsFor(page.candidates.map((candidate) => candidate.result?.total ?? 0), settings);
  const claims = page.claims.map(({ typedAt, receivedAt, ...claim }) => ({ ...claim, typed: typedAt ? showSecond(typedAt, settings) : '', received: showSecond(receivedAt, settings) }));
  return (
    <>
      <PageHead title={page.title} says={`Class ${page.className} · sat ${showDate(page.startsAt, settings)} · ${page.marks} marks`} back={{ href: '/marking', label: 'Marking' }}>
        <Steps page={page} />
      </PageHead>
      <div className="beside">
        <div className="min-w-0">
          <CandidatesLedger sittingId={page.id} candidates={page.candidates} decimals={decimals} />
          {claims.length > 0 && <ClaimsPanel claims={claims} decide={decideClaimAction} />}
        </div>
        <section className="section--cap" aria-labelledby="way-head">
          <h2 id="way-head">What stands in the way of a release</h2>
          <Conditions conditions={page.conditions} />
        </section>
      </div>
      <section className="section" aria-labelledby="items-head">
        <h2 id="items-head">How the parts came out</h2>
        <ItemsLedger items={page.items} />
      </section>
    </>
  );
}
