import '@fontsource-variable/besley/wght.css';
import '@fontsource/jetbrains-mono/latin-500.css';
import '@fontsource/jetbrains-mono/latin-600.css';
import '@fontsource/jetbrains-mono/latin-700.css';
import '@fontsource/jetbrains-mono/latin-ext-500.css';
import '@fontsource/jetbrains-mono/latin-ext-600.css';
import '@fontsource/jetbrains-mono/latin-ext-700.css';
import './globals.css';
import type { Metadata, Viewport } from 'next';
import { headers } from 'next/headers';
import type { ReactNode } from 'react';
import { ShownTheme } from '@/components/ui/theme';
import { THEME_SCRIPT } from '@/components/ui/theme-script';

export const metadata: Metadata = {
  title: { default: 'Fallbright', template: '%s · Fallbright' },
  description: 'The watch kept over small fermentations until they fall bright.',
  robots: { index: false, follow: false },
  icons: { icon: '/icon.svg', apple: '/apple-touch-icon.png' },
  appleWebApp: { capable: true, title: 'Fallbright', statusBarStyle: 'default' },
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1, viewportFit: 'cover' };

export default async function RootLayout({ children }: { children: ReactNode }) {
  // The proxy puts the answer's content policy on the request too; the theme's script needs its nonce.
  const nonce = /'nonce-([^']+)'/.exec((await headers()).get('content-security-policy') ?? '')?.[1];
  return (
    // The script below sets the theme before React takes over.
    <html lang="en" data-theme="day" suppressHydrationWarning>
      <head>
        <script nonce={nonce} suppressHydrationWarning dangerouslySetInnerHTML={{ __html: THEME_SCRIPT }} />
      </head>
      <body>
        <ShownTheme />
        {children}
      </body>
    </html>
  );
}
