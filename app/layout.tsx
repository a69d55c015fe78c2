import type { Metadata, Viewport } from 'next';
import { cookies } from 'next/headers';
import type { ReactNode } from 'react';
import { fontClasses } from '@/app/fonts';
import { THEME_COOKIE, readTheme } from '@/components/shell/theme';
import { Toaster } from '@/components/ui/toaster';
import '@/app/globals.css';

export const metadata: Metadata = {
  title: { default: 'Kalends', template: '%s · Kalends' },
  description:
    'When will the patients be in, and when the events? Forecasts of a clinical trial’s dates, with their uncertainty.',
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1 };

/** The chosen sheet comes with the request, so that no page flashes in the other one before a script has run. */
export default async function RootLayout({ children }: { children: ReactNode }) {
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <html lang="en-GB" data-theme={theme} className={fontClasses}>
      <body>
        {children}
        <Toaster />
      </body>
    </html>
  );
}
