import type { Metadata, Viewport } from 'next'
import type { ReactNode } from 'react'
import './globals.css'

export const metadata: Metadata = {
  title: { default: 'Farbench', template: '%s · Farbench' },
  description: 'A workbench that goes as far as the machine does.',
  applicationName: 'Farbench',
  manifest: '/manifest.webmanifest',
  icons: {
    icon: [
      { url: '/favicon.ico', sizes: '32x32' },
      { url: '/icons/icon.svg', type: 'image/svg+xml' },
    ],
    apple: '/icons/apple-180.png',
  },
  appleWebApp: { capable: true, title: 'Farbench', statusBarStyle: 'default' },
  formatDetection: { telephone: false, date: false, address: false, email: false },
}

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  viewportFit: 'cover',
  themeColor: '#fcfcf6',
}

/** The document around every page. theme.js sets the theme before the first paint. */
export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en-GB" data-theme="day" suppressHydrationWarning={true}>
      <head>
        <link
          rel="preload"
          href="/fonts/big-shoulders-latin-wght-normal.woff2"
          as="font"
          type="font/woff2"
          crossOrigin=""
        />
        <link
          rel="preload"
          href="/fonts/atkinson-hyperlegible-next-latin-wght-normal.woff2"
          as="font"
          type="font/woff2"
          crossOrigin=""
        />
        {/* Not async: it must run before the first paint, and the policy forbids inline script. */}
        <script src="/theme.js" />
      </head>
      <body>{children}</body>
    </html>
  )
}
