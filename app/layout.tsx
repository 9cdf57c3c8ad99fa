import type { Metadata, Viewport } from 'next';
import localFont from 'next/font/local';
import type { ReactNode } from 'react';
import './globals.css';

const text = localFont({
  src: [
    { path: '../fonts/atkinson-hyperlegible-next-latin-400-normal.woff2', weight: '400' },
    { path: '../fonts/atkinson-hyperlegible-next-latin-700-normal.woff2', weight: '700' },
  ],
  variable: '--font-text',
  display: 'swap',
});

const digits = localFont({
  src: [
    { path: '../fonts/atkinson-hyperlegible-mono-latin-400-normal.woff2', weight: '400' },
    { path: '../fonts/atkinson-hyperlegible-mono-latin-700-normal.woff2', weight: '700' },
  ],
  variable: '--font-digits',
  display: 'swap',
});

export const metadata: Metadata = {
  title: { default: 'Lammas', template: '%s · Lammas' },
  description: 'A second look at every tree measurement, while the crew still stands at the tree.',
  icons: { icon: '/icons/lammas.svg', apple: '/icons/lammas-192.png' },
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1, themeColor: '#f8f4e8' };

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en" className={`${text.variable} ${digits.variable}`}>
      <body>{children}</body>
    </html>
  );
}
