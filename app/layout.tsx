import type { Metadata, Viewport } from 'next';
import { cookies, headers } from 'next/headers';
import type { ReactNode } from 'react';
import { readViewSettings, viewAttributes } from '@/components/shell/view-settings';
import '@/fonts/plex-sans.css';
import '@/fonts/plex-condensed.css';
import '@/fonts/plex-mono.css';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Fullfield', template: '%s · Fullfield' },
  description: 'Exam bank and proctored assessment for electrical trade schools.',
  robots: { index: false, follow: false },
};

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  colorScheme: 'light dark',
};

export default async function RootLayout({ children }: { children: ReactNode }) {
  // Client code that makes style elements reads the nonce from the meta element: a prop is stale after a soft navigation.
  const nonce = (await headers()).get('x-nonce') ?? undefined;
  const view = viewAttributes(readViewSettings(await cookies()));
  return (
    <html lang="en" {...view} suppressHydrationWarning>
      <head>{nonce && <meta property="csp-nonce" content={nonce} />}</head>
      <body>
        <a className="skip btn btn--main" href="#main">
          Go to the page
        </a>
        {children}
      </body>
    </html>
  );
}
