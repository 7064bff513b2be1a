export type HeardLetter = { name: string; to: string[]; subject: string }

/** Starts the local mail server; port 0 takes any free one. */
export function startMail(how: {
  port: number
  folder: string
  heard?: (letter: HeardLetter) => void
}): Promise<{ port: number; stop(): Promise<void> }>
