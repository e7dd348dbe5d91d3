import type { ReactNode } from 'react';
import { StudentFrame } from '@/app/frames';
import { pageContext } from '@/lib/auth/context';

/** The frame of a student's places; the exam room, in a route group of its own, has none. */
export default async function StudentLayout({ children }: { children: ReactNode }) {
  return <StudentFrame context={await pageContext('student')}>{children}</StudentFrame>;
}
