import type { ReactNode } from 'react';
import { AccountMenu, type Account } from './AccountMenu';
import { Brand } from './Mark';
import { Places, type Place } from './Places';
import type { ViewSettings } from './view-settings';

type StudentShellProps = {
  places: readonly Place[];
  account: Account & { view?: ViewSettings; links?: ReactNode };
  signOut: ReactNode;
  children: ReactNode;
};

/** A student's screens (Today, Practice, My results): places in the bar, on a phone as tabs at the thumb. */
export function StudentShell({ places, account, signOut, children }: StudentShellProps) {
  return (
    <div className="student">
      <header className="topbar">
        <Brand href={places[0]?.href} />
        <Places places={places} />
        <div className="topbar__right">
          <AccountMenu account={account} view={account.view} signOut={signOut}>
            {account.links}
          </AccountMenu>
        </div>
      </header>
      <main id="main" tabIndex={-1} className="page">
        {children}
      </main>
    </div>
  );
}
