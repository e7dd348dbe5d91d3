import { NewPasswordForm } from '@/components/auth/NewPasswordForm';
import { LinkButton } from '@/components/ui/LinkButton';
import { Notice } from '@/components/ui/Notice';
import { appDb } from '@/db/client';
import { deadLink, type LinkPurpose } from '@/lib/auth/model';
import { readLink } from '@/lib/auth/queries';
import { choosePassword } from './actions';
import { SchoolDoor } from './door';

/** Where a mailed link leads: looking at it uses nothing up, the form's button does. */
export async function LinkPage({ purpose, token, title }: { purpose: LinkPurpose; token: string; title: string }) {
  const link = await readLink(appDb(), purpose, token);
  return (
    <SchoolDoor>
      <h2 className="text-28">{title}</h2>
      {link ? (
        <>
          <p className="mt-1 mb-6 text-15 text-ink-soft">
            For {link.name}. You sign in with <b>{link.identifier}</b>.
          </p>
          <NewPasswordForm token={token} identifier={link.identifier} choose={choosePassword.bind(null, purpose)} />
        </>
      ) : (
        <div className="mt-6 grid gap-5">
          <Notice kind="wait">
            <p>{deadLink}</p>
          </Notice>
          <LinkButton href="/reset" look="main" size="exam">
            Have a link sent
          </LinkButton>
          <LinkButton href="/sign-in" size="exam">
            Go to sign in
          </LinkButton>
        </div>
      )}
    </SchoolDoor>
  );
}
