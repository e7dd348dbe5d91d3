import type { Metadata } from 'next';
import { LinkPage } from '../../link-page';

// The address holds the token: it is given to no other page.
export const metadata: Metadata = { title: 'Choose a new password', referrer: 'no-referrer' };

export default async function ResetPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  return <LinkPage purpose="reset" token={token} title="Choose a new password" />;
}
