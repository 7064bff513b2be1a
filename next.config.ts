import type { NextConfig } from 'next'

const config: NextConfig = {
  poweredByHeader: false,
  reactStrictMode: true,
  /** Every field screen is the one static document /field; the service worker maps the same way offline. */
  rewrites: async () => [{ source: '/field/:path+', destination: '/field' }],
  headers: async () => [
    {
      source: '/sw.js',
      headers: [
        { key: 'cache-control', value: 'no-cache, no-store, must-revalidate' },
        { key: 'content-type', value: 'application/javascript; charset=utf-8' },
      ],
    },
    { source: '/:path*', headers: [{ key: 'x-content-type-options', value: 'nosniff' }] },
    {
      /** For documents; what a phone in thin signal fetches from /api carries nothing it does not need. */
      source: '/((?!api/).*)',
      headers: [
        { key: 'referrer-policy', value: 'same-origin' },
        { key: 'cross-origin-opener-policy', value: 'same-origin' },
        {
          key: 'permissions-policy',
          value: 'geolocation=(self), camera=(self), microphone=(self)',
        },
      ],
    },
  ],
  /** Types are checked once, by npm run check; a build on a bare machine need not do it again. */
  typescript: { ignoreBuildErrors: true },
  serverExternalPackages: [
    'pg',
    'graphile-worker',
    'nodemailer',
    '@aws-sdk/client-s3',
    '@tus/server',
    '@tus/file-store',
    'sharp',
  ],
}

export default config
