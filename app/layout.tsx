import type { Metadata, Viewport } from 'next';
import { cookies, headers } from 'next/headers';
import type { ReactNode } from 'react';
import { NonceMeta } from '@/components/shell/NonceMeta';
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
  const nonce = (await headers()).get('x-nonce') ?? undefined;
  const view = viewAttributes(readViewSettings(await cookies()));
  return (
    <html lang="en" {...view} suppressHydrationWarning>
      <head>{nonce && <NonceMeta nonce={nonce} />}</head>
      <body>
        <a className="skip btn btn--main" href="#main">
          Go to the page
        </a>
        {children}
      </body>
    </html>
  );
}
