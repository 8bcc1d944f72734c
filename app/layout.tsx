/** The document around every page: language, typefaces, the nonce for style elements that the controls add. */
import type { Metadata, Viewport } from 'next';
import { headers } from 'next/headers';
import type { ReactNode } from 'react';
import { literata, literataExtended, publicSans, publicSansExtended } from './fonts';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Elbowroom', template: '%s · Elbowroom' },
  description: 'Where a two-firm market is heading, how sure that is, and what would change it.',
  robots: { index: false, follow: false },
};

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#fbfaf6' },
    { media: '(prefers-color-scheme: dark)', color: '#171613' },
  ],
};

export default async function RootLayout({ children }: { children: ReactNode }) {
  const nonce = (await headers()).get('x-nonce') ?? undefined;
  const fonts = [literata, literataExtended, publicSans, publicSansExtended].map((font) => font.variable);
  return (
    <html lang="en-GB" className={fonts.join(' ')}>
      <head>
        <meta property="csp-nonce" nonce={nonce} content={nonce} />
      </head>
      <body>{children}</body>
    </html>
  );
}
