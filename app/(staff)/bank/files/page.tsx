import type { Metadata } from 'next';
import { BringInFiles } from '@/components/bank/BringInFiles';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { bringInFilesAction } from '../actions';

export const metadata: Metadata = { title: 'Bring in files' };

export default async function FilesPage() {
  await pageContext('instructor');
  return (
    <>
      <PageHead title="Bring in files" says="Template files that are kept elsewhere, such as under version control." back={{ href: '/bank', label: 'Bank' }} />
      <BringInFiles bringIn={bringInFilesAction} />
    </>
  );
}
