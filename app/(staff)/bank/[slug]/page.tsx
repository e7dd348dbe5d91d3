import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { TemplateBench } from '@/components/bank/TemplateBench';
import { QueryProvider } from '@/components/shell/QueryProvider';
import { pageContext } from '@/lib/auth/context';
import { areaTitles } from '@/lib/bank/areas';
import { templatePage } from '@/lib/bank/queries';
import type { TemplatePage, TemplateShown } from '@/lib/bank/views';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';
import * as actions from '../actions';

type Params = { params: Promise<{ slug: string }> };

const load = cache(async (slug: string) => {
  const context = await pageContext('instructor');
  const page = await templatePage(context, slug);
  if (!page.ok) notFound();
  return { page: page.value, settings: (await readSchool(context.db)).settings };
});

export async function generateMetadata({ params }: Params): Promise<Metadata> {
  return { title: (await load((await params).slug)).page.title };
}

function inWords(page: TemplatePage, moment: (time: Date) => string): TemplateShown {
  const { check } = page;
  return {
    ...page,
    changedAt: moment(page.changedAt),
    versions: page.versions.map((version) => ({
      ...version, madeAt: moment(version.madeAt), decidedAt: version.decidedAt && moment(version.decidedAt), retiredAt: version.retiredAt && moment(version.retiredAt),
    })),
    check: check && { id: check.id, state: check.state, done: check.done, draws: check.draws, says: check.says, current: check.current, report: check.report },
  };
}

export default async function TemplatePageView({ params }: Params) {
  const { page, settings } = await load((await params).slug);
  const { saveDraftAction, saveFormAction, startCheckAction, cancelCheckAction, askForReviewAction, decideReviewAction, takeBackAction, retireAction } = actions;
  return (
    <QueryProvider>
      <TemplateBench
        key={page.id}
        template={inWords(page, (time) => showMoment(time, settings))}
        areaTitle={areaTitles()[page.area] ?? page.area}
        locale={settings.locale}
        actions={{
          save: saveDraftAction,
          saveForm: saveFormAction,
          check: { start: startCheckAction, cancel: cancelCheckAction },
          review: { ask: askForReviewAction, decide: decideReviewAction, takeBack: takeBackAction, retire: retireAction },
        }}
      />
    </QueryProvider>
  );
}
