import type { Metadata, Viewport } from 'next';
import { cookies } from 'next/headers';
import type { ReactNode } from 'react';
import { Providers } from '@/components/shell/providers';
import { splineSans, splineSansExtended, splineSansMono, splineSansMonoExtended } from '@/fonts/faces';
import { THEME_COOKIE, themeOf } from '@/lib/rules/themes';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Weighhouse', template: '%s · Weighhouse' },
  description: 'Mass, balance and inertia of a show’s assets, from their limit surfaces.',
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1, colorScheme: 'dark light' };

const faces = [splineSans, splineSansExtended, splineSansMono, splineSansMonoExtended]
  .map((face) => face.variable)
  .join(' ');

export default async function RootLayout({ children }: { children: ReactNode }) {
  const theme = themeOf((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <html lang="en" data-theme={theme} className={faces}>
      <body>
        <Providers>{children}</Providers>
      </body>
    </html>
  );
}
