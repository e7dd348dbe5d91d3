import type { Metadata } from 'next';
import { LinkPage } from '../../link-page';

// The address holds the token: it is given to no other page.
export const metadata: Metadata = { title: 'Welcome', referrer: 'no-referrer' };

export default async function InvitationPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  return <LinkPage purpose="invitation" token={token} title="Welcome" />;
}
