import { cookies } from 'next/headers';
import Link from 'next/link';
import type { ReactNode } from 'react';
import { FindAll } from '@/components/shell/FindAll';
import type { Place } from '@/components/shell/Places';
import { StaffShell } from '@/components/shell/StaffShell';
import { StudentShell } from '@/components/shell/StudentShell';
import { readViewSettings } from '@/components/shell/view-settings';
import { Button } from '@/components/ui/Button';
import type { SignedIn } from '@/lib/auth/context';
import { type Role, roles } from '@/lib/context';
import { readSchool } from '@/lib/school/queries';
import { signOut } from './sign-out';

const staffPlaces: readonly (Place & { for: readonly Role[] })[] = [
  { href: '/bank', label: 'Bank', for: ['instructor'] },
  { href: '/exams', label: 'Exams', for: ['instructor'] },
  { href: '/sittings', label: 'Sittings', for: ['instructor', 'proctor', 'registrar'] },
  { href: '/marking', label: 'Marking', for: ['instructor'] },
  { href: '/records', label: 'Records', for: ['instructor', 'registrar'] },
  { href: '/people', label: 'People', for: ['registrar'] },
];

const studentPlaces: readonly Place[] = [
  { href: '/today', label: 'Today' },
  { href: '/rehearse', label: 'Rehearse' },
  { href: '/results', label: 'My results' },
];

async function accountOf({ actor }: SignedIn, links: ReactNode) {
  return { name: actor.name, role: roles.filter((role) => actor.roles.has(role)).join(', '), view: readViewSettings(await cookies()), links };
}

const signOutForm = (
  <form action={signOut}>
    <Button type="submit">Sign out</Button>
  </form>
);

/** The staff screens' frame, with the places that this person's roles may enter. */
export async function StaffFrame({ context, children }: { context: SignedIn; children: ReactNode }) {
  const { actor } = context;
  const school = await readSchool(context.db);
  const links = (
    <>
      <Link href="/account">My account</Link>
      {actor.roles.has('registrar') && <Link href="/school">School settings</Link>}
      {actor.roles.has('student') && <Link href="/today">Go to my own sittings</Link>}
    </>
  );
  const places = staffPlaces.filter((place) => place.for.some((role) => actor.roles.has(role)));
  return (
    <StaffShell school={school.name} places={places} account={await accountOf(context, links)} signOut={signOutForm} search={<FindAll address="/api/find" />}>
      {children}
    </StaffShell>
  );
}

/** A student's frame. */
export async function StudentFrame({ context, children }: { context: SignedIn; children: ReactNode }) {
  const staff = [...context.actor.roles].some((role) => role !== 'student');
  const links = (
    <>
      <Link href="/account">My account</Link>
      {staff && <Link href="/">Go to the staff screens</Link>}
    </>
  );
  return (
    <StudentShell places={studentPlaces} account={await accountOf(context, links)} signOut={signOutForm}>
      {children}
    </StudentShell>
  );
}
