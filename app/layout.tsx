import type { Metadata, Viewport } from 'next';
import { cookies, headers } from 'next/headers';
import type { ReactNode } from 'react';
import { fontClasses } from '@/app/fonts';
import { StyleNonce } from '@/components/shell/style-nonce';
import { THEME_COOKIE, readTheme } from '@/components/shell/theme';
import { Toaster } from '@/components/ui/toaster';
import '@/app/globals.css';

export const metadata: Metadata = {
  icons: { icon: '/icon.svg' },
  title: { default: 'Kalends', template: '%s · Kalends' },
  description:
    'When will the patients be in, and when the events? Forecasts of a clinical trial’s dates, with their uncertainty.',
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1 };

/** The chosen sheet comes with the request, so that no page flashes in the other one before a script has run. */
export default async function RootLayout({ children }: { children: ReactNode }) {
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  const nonce = (await headers()).get('x-nonce');
  return (
    <html lang="en-GB" data-theme={theme} className={fontClasses}>
      <body>
        {children}
        {nonce && <StyleNonce nonce={nonce} />}
        <Toaster />
      </body>
    </html>
  );
}
