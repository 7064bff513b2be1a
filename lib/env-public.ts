/** Settings the browser may read; Next.js writes them into the build. */
export const envPublic = {
  /** True in a production build: only then is the service worker registered. */
  production: process.env.NODE_ENV === 'production',
}
