/** How the app is shown, and what a person can carry out of it by hand. */
export type Display = {
  /**
   * True in a browser tab of a phone whose browser clears what a site keeps after seven days without a
   * visit unless the app is on the home screen (WebKit, "Updates to storage policy", 2020): those
   * browsers alone say whether they run from the home screen in `navigator.standalone`.
   */
  mayBeCleared(): boolean
  /** Puts words on the clipboard; false when the browser refuses. */
  copy(words: string): Promise<boolean>
}

/** The browser's own. */
export const browserDisplay: Display = {
  mayBeCleared: () =>
    (globalThis.navigator as { standalone?: boolean } | undefined)?.standalone === false,
  async copy(words) {
    try {
      await navigator.clipboard.writeText(words)
      return true
    } catch {
      return false
    }
  },
}
