/**
 * A place outside of the field's stores for a few words that are about nobody: it mostly outlives a store
 * that the browser clears. `read` answers every copy there is, `write` replaces them.
 */
export type Keeper = { read(): string[]; write(words: string): void }

const NAME = 'farbench-keepsake'
/** Longest life a browser gives a cookie: 400 days (RFC 6265bis, draft). */
const LIFE_SECONDS = 400 * 24 * 3600

/**
 * The browser's: local storage, and a cookie that only the field's own pages read, so that it does not
 * travel with what is sent. The service worker has neither: it reads nothing and writes nothing.
 */
export const browserKeeper: Keeper = {
  read: () => [fromStorage(), fromCookie()].filter((words) => words !== null),
  write(words) {
    if (typeof document === 'undefined') return
    try {
      localStorage.setItem(NAME, words)
    } catch {
      // Storage that is full or refused: the cookie is left.
    }
    const secure = location.protocol === 'https:' ? '; Secure' : ''
    // biome-ignore lint/suspicious/noDocumentCookie: the Cookie Store API is missing in two of three browsers.
    document.cookie = `${NAME}=${encodeURIComponent(words)}; Path=/field; Max-Age=${LIFE_SECONDS}; SameSite=Strict${secure}`
  },
}

function fromStorage(): string | null {
  try {
    return globalThis.localStorage?.getItem(NAME) ?? null
  } catch {
    return null
  }
}

function fromCookie(): string | null {
  if (typeof document === 'undefined') return null
  const pair = document.cookie.split('; ').find((one) => one.startsWith(`${NAME}=`))
  try {
    return pair === undefined ? null : decodeURIComponent(pair.slice(NAME.length + 1))
  } catch {
    return null
  }
}
