import { ActionButton } from '@/components/forms/ActionButton';
import type { AccountState } from '@/lib/people/model';
import type { Result } from '@/lib/result';

type Run = () => Promise<Result<null>>;
type Props = { name: string; state: AccountState; hasEmail: boolean; sendLink: Run; close: Run; reopen: Run };

/** What a registrar can do to an account as a whole. */
export function AccountActions({ name, state, hasEmail, sendLink, close, reopen }: Props) {
  if (state === 'closed') return <ActionButton label="Reopen the account" run={reopen} done="The account is open again, with the roles it had." />;
  const link = state === 'invited' ? 'Send the invitation again' : 'Send a link for a new password';
  return (
    <div className="flex flex-wrap items-start gap-2">
      {hasEmail && <ActionButton label={link} run={sendLink} done="A link is on its way. Earlier links no longer work." />}
      <ActionButton
        label="Close the account"
        look="stop"
        run={close}
        confirm={{ title: `Close the account of ${name}?`, says: 'Access ends at once on every device, in a sitting too. Everything on record stays. You can reopen it.', verb: 'Close the account' }}
      />
    </div>
  );
}
