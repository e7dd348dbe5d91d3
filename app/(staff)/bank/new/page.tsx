import type { Metadata } from 'next';
import { NewTemplateForm } from '@/components/bank/NewTemplateForm';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { areaList, cautionList } from '@/lib/bank/areas';
import { newTemplateAction } from '../actions';

export const metadata: Metadata = { title: 'New template' };

export default async function NewTemplatePage() {
  await pageContext('instructor');
  return (
    <>
      <PageHead title="New template" says="Name it; then write its givens, parts and solution beside a live draw." back={{ href: '/bank', label: 'Bank' }} />
      <NewTemplateForm areas={areaList()} cautions={cautionList()} make={newTemplateAction} />
    </>
  );
}
