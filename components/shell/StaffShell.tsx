import type { ReactNode } from 'react';
import { AccountMenu, type Account } from './AccountMenu';
import { Brand } from './Mark';
import { Places, PlacesMenu, type Place } from './Places';
import type { ViewSettings } from './view-settings';

type StaffShellProps = {
  school: string;
  places: readonly Place[];
  account: Account & { view?: ViewSettings; links?: ReactNode };
  /** A `<form>` whose button signs out. */
  signOut: ReactNode;
  /** FindAll, or nothing. */
  search?: ReactNode;
  children: ReactNode;
};

/**
 * The bar along the top of every staff screen, and the page under it (`<main>`): mark and school, the places this
 * role may enter (Bank, Exams, Sittings, Marking, Records, People), search, account.
 */
export function StaffShell({ school, places, account, signOut, search, children }: StaffShellProps) {
  return (
    <>
      <header className="topbar topbar--staff">
        <Brand href={places[0]?.href} school={school} />
        <Places places={places} />
        <PlacesMenu places={places} />
        <div className="topbar__right">
          {search}
          <AccountMenu account={account} view={account.view} signOut={signOut}>
            {account.links}
          </AccountMenu>
        </div>
      </header>
      <main className="page" id="main" tabIndex={-1}>
        {children}
      </main>
    </>
  );
}
