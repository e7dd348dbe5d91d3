import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SlipForm } from '@/components/auth/SlipForm';
import { signedIn } from '@/lib/auth/context';
import { SchoolDoor } from '../door';

export const metadata: Metadata = { title: 'Sign in with a slip' };

export default async function SlipPage() {
  if (await signedIn()) redirect('/');
  return (
    <SchoolDoor>
      <h2 className="text-28">Use the code on my slip</h2>
      <p className="mt-1 mb-6 text-15 text-ink-soft">The exam office or your proctor gave you a slip with your learner number and a code for the day.</p>
      <SlipForm />
    </SchoolDoor>
  );
}
