import type { ReactNode } from 'react';
import { Menu } from './Menu';
import { ViewSwitch } from './ViewSwitch';
import type { ViewSettings } from './view-settings';

export type Account = { name: string; role?: string };

/** Who is signed in; view settings; links (`children`) and the sign-out form. */
export function AccountMenu({ account, view, signOut, children }: { account: Account; view?: ViewSettings; signOut: ReactNode; children?: ReactNode }) {
  return (
    <Menu
      label={
        <span>
          {account.name}
          {account.role && <span className="menu__role">, {account.role}</span>}
        </span>
      }
    >
      {children && <div>{children}</div>}
      <ViewSwitch initial={view} />
      <div>{signOut}</div>
    </Menu>
  );
}
