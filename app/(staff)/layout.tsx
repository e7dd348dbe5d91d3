import type { ReactNode } from 'react';
import { StaffFrame } from '@/app/frames';
import { pageContext } from '@/lib/auth/context';

/** The frame alone: what may be seen is decided in each page's queries. */
export default async function StaffLayout({ children }: { children: ReactNode }) {
  return <StaffFrame context={await pageContext('instructor', 'proctor', 'registrar')}>{children}</StaffFrame>;
}
