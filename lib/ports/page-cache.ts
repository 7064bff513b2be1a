/** Copies of pages and files that the browser keeps for the app (Cache Storage). */
export type PageCache = {
  /** Drops everything but the app itself, which opens without signal and holds nobody's work. */
  dropAll(): Promise<void>
}

/** The browser's; the app itself lies in the caches that the worker's list of its own build fills. */
export const browserPageCache: PageCache = {
  async dropAll() {
    if (typeof caches === 'undefined') return
    const names = await caches.keys()
    await Promise.all(
      names.filter((name) => !name.includes('precache')).map((name) => caches.delete(name)),
    )
  },
}
