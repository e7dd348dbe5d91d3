import { redirect } from 'next/navigation';
import { signedIn } from '@/lib/auth/context';
import { firstPlace } from '@/lib/auth/rules';

/** The start: everybody's own first place, or the way in. */
export default async function StartPage() {
  const context = await signedIn();
  redirect(context ? firstPlace(context.actor.roles) : '/sign-in');
}
