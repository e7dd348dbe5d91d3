import type { Metadata } from 'next';
import { ChangePasswordForm } from '@/components/auth/ChangePasswordForm';
import { Button } from '@/components/ui/Button';
import { PageHead } from '@/components/ui/PageHead';
import { Pairs } from '@/components/ui/Pairs';
import { pageContext } from '@/lib/auth/context';
import { readOwnAccount } from '@/lib/auth/queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';
import { changeOwnPassword, signOutEverywhere } from './actions';

export const metadata: Metadata = { title: 'My account' };

export default async function AccountPage() {
  const { db, actor, signInId } = await pageContext();
  const [account, { settings }] = await Promise.all([readOwnAccount(db, actor), readSchool(db)]);
  const pairs = [
    { label: 'Name', value: account.name },
    { label: 'E-mail', value: account.email ?? 'none' },
    { label: 'Learner number', value: account.learnerNumber ?? 'none' },
    { label: 'Roles', value: [...actor.roles].join(', ') },
  ];
  return (
    <>
      <PageHead title="My account" says="Name, number and e-mail are changed by the exam office." />
      <div className="grid items-start gap-x-12 gap-y-10 lg:grid-cols-2">
        <section aria-labelledby="who" className="grid gap-4">
          <h2 id="who" className="text-22">Particulars</h2>
          <Pairs pairs={pairs} />
        </section>
        <section aria-labelledby="password-title" className="grid gap-4">
          <h2 id="password-title" className="text-22">Password</h2>
          <ChangePasswordForm identifier={account.email ?? account.learnerNumber ?? ''} hasPassword={account.hasPassword} change={changeOwnPassword} />
        </section>
        <section aria-labelledby="devices" className="grid gap-4">
          <h2 id="devices" className="text-22">Signed in now</h2>
          <ul>
            {account.signIns.map((one) => (
              <li key={one.id} className="flex flex-wrap justify-between gap-x-4 border-b border-rule py-2 text-15">
                <span>
                  {one.device}
                  {one.id === signInId && ', this one'}
                </span>
                <span className="text-ink-soft">since {showMoment(one.beganAt, settings)}</span>
              </li>
            ))}
          </ul>
          <form action={signOutEverywhere}>
            <Button type="submit" look="stop">
              Sign out on every device
            </Button>
          </form>
        </section>
      </div>
    </>
  );
}
