import type { Metadata, Viewport } from 'next';
import { cookies } from 'next/headers';
import { connection } from 'next/server';
import type { ReactNode } from 'react';
import { numberFont, sizeFont, textFont } from '@/app/fonts';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Wiretag', template: '%s · Wiretag' },
  description: 'Work orders between an engine rebuilder and its machine shops.',
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1, themeColor: '#16202c' };

export default async function RootLayout({ children }: { children: ReactNode }) {
  await connection();
  const shift = (await cookies()).get('shift')?.value;
  return (
    <html
      lang="en"
      data-shift={shift === 'night' ? 'night' : 'day'}
      className={`${textFont.variable} ${sizeFont.variable} ${numberFont.variable}`}
    >
      <body>{children}</body>
    </html>
  );
}
