// The floor of the sync bars: the same Next.js, the same headers as the product's API, and nothing in between.
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../../..', import.meta.url))

/** @type {import('next').NextConfig} */
export default {
  poweredByHeader: false,
  reactStrictMode: true,
  turbopack: { root },
  outputFileTracingRoot: root,
  headers: () =>
    Promise.resolve([
      { source: '/:path*', headers: [{ key: 'x-content-type-options', value: 'nosniff' }] },
    ]),
  serverExternalPackages: ['pg'],
}
