import type { ReactNode } from 'react';
import { StaffFrame, StudentFrame } from '@/app/frames';
import { pageContext } from '@/lib/auth/context';

/** The frame that the person knows: staff, or student. */
export default async function AccountLayout({ children }: { children: ReactNode }) {
  const context = await pageContext();
  const Frame = [...context.actor.roles].some((role) => role !== 'student') ? StaffFrame : StudentFrame;
  return <Frame context={context}>{children}</Frame>;
}
