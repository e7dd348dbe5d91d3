import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SignInForm } from '@/components/auth/SignInForm';
import { Notice } from '@/components/ui/Notice';
import { appDb } from '@/db/client';
import { signedIn } from '@/lib/auth/context';
import { safeNext } from '@/lib/auth/rules';
import { readSchool } from '@/lib/school/queries';
import { SchoolDoor } from '../door';

export const metadata: Metadata = { title: 'Sign in' };

type Props = { searchParams: Promise<{ next?: string | string[]; done?: string | string[] }> };

const notices: Readonly<Record<string, string>> = {
  password: 'Your password is set. Sign in with it.',
  out: 'You are signed out.',
  everywhere: 'You are signed out on every device.',
};

export default async function SignInPage({ searchParams }: Props) {
  const { next, done } = await searchParams;
  const wanted = safeNext(typeof next === 'string' ? next : null) ?? '/';
  if (await signedIn()) redirect(wanted);
  const { settings } = await readSchool(appDb());
  const says = typeof done === 'string' ? notices[done] : undefined;
  return (
    <SchoolDoor>
      {says && (
        <div className="mb-6">
          <Notice kind="ok">
            <p>{says}</p>
          </Notice>
        </div>
      )}
      <SignInForm next={wanted} office={settings.office} />
    </SchoolDoor>
  );
}
