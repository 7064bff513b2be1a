/** What a page of the field hears of its browser. */
export type BrowserEvents = {
  online(): void
  /** The page is looked at, or looked at again. */
  visible(): void
  /** The browser is about to put this page to sleep, perhaps in the middle of a call (P19). */
  asleep(): void
}

/** Listens until the answer is called; outside of a page there is nothing to hear. */
export function listenToBrowser(on: BrowserEvents): () => void {
  if (typeof document === 'undefined') return () => undefined
  const visible = () => {
    if (document.visibilityState === 'visible') on.visible()
  }
  const heard: [EventTarget, string, () => void][] = [
    [globalThis, 'online', on.online],
    [globalThis, 'pageshow', visible],
    [globalThis, 'pagehide', on.asleep],
    [document, 'freeze', on.asleep],
    [document, 'resume', visible],
    [document, 'visibilitychange', visible],
  ]
  for (const [target, name, run] of heard) target.addEventListener(name, run)
  return () => {
    for (const [target, name, run] of heard) target.removeEventListener(name, run)
  }
}
