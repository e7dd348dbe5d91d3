import type { Metadata } from 'next';
import { ResetRequestForm } from '@/components/auth/ResetRequestForm';
import { askForReset } from '../actions';
import { SchoolDoor } from '../door';

export const metadata: Metadata = { title: 'A new password' };

export default function ResetPage() {
  return (
    <SchoolDoor>
      <h2 className="text-28">A new password</h2>
      <p className="mt-1 mb-6 text-15 text-ink-soft">A link to choose one is sent to the e-mail of your account.</p>
      <ResetRequestForm ask={askForReset} />
    </SchoolDoor>
  );
}
