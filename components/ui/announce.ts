/**
 * Messages for the two live regions. Polite ones are merged to one every five seconds; assertive
 * ones (stuck work, storage lost) go out at once. Any part of a screen may call it.
 */
export type Voice = 'polite' | 'assertive'
type Listener = (text: string, voice: Voice) => void

const listeners = new Set<Listener>()

/** Says a sentence to people who do not see the screen. */
export function announce(text: string, voice: Voice = 'polite'): void {
  for (const listener of listeners) {
    listener(text, voice)
  }
}

/** For the live region alone: hears every announcement until the answer is called. */
export function onAnnounce(listener: Listener): () => void {
  listeners.add(listener)
  return () => {
    listeners.delete(listener)
  }
}
