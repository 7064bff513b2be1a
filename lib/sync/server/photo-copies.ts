import sharp from 'sharp'
import { fail, ok, type Result } from '@/lib/model/result'
import type { HttpProblem } from './problems'

/**
 * The copies of a picture that people look at: made anew from its pixels, so that nothing but the picture
 * can be in them. The original stays as it came.
 */
export const COPY_SIZES = { thumb: 320, show: 1600 } as const
export type CopySize = keyof typeof COPY_SIZES
export type Copies = Record<CopySize, Buffer>

/** Most pixels we open (a choice: four times what a phone of ours makes); more is a bomb. */
export const MAX_PIXELS = 16_000_000
/** Pictures opened at once in this process; an open one may take 64 MB. */
const AT_ONCE = 2

sharp.cache(false)
sharp.concurrency(1)

let busy = 0
const waiting: (() => void)[] = []

async function inTurn<T>(run: () => Promise<T>): Promise<T> {
  if (busy >= AT_ONCE) await new Promise<void>((go) => waiting.push(go))
  else busy += 1
  try {
    return await run()
  } finally {
    const next = waiting.shift()
    if (next) next()
    else busy -= 1
  }
}

const open = (bytes: Buffer) => sharp(bytes, { limitInputPixels: MAX_PIXELS, failOn: 'none' })

/** Longest edge at most `edge` pixels, upright, JPEG without metadata. */
const copy = (bytes: Buffer, edge: number): Promise<Buffer> =>
  open(bytes)
    .autoOrient()
    .resize({ width: edge, height: edge, fit: 'inside', withoutEnlargement: true })
    .flatten({ background: '#ffffff' })
    .jpeg({ quality: 80 })
    .toBuffer()

/**
 * Makes the copies. `tooManyPixels` before anything is unpacked, `wrongPicture` for what no picture can
 * be made of; a picture cut off at its end is shown as far as it goes.
 */
export function makeCopies(bytes: Buffer): Promise<Result<Copies, HttpProblem>> {
  return inTurn(async () => {
    try {
      const { width = 0, height = 0 } = await sharp(bytes, { limitInputPixels: false }).metadata()
      if (width * height > MAX_PIXELS) return fail({ kind: 'tooManyPixels' })
      const show = await copy(bytes, COPY_SIZES.show)
      return ok({ show, thumb: await copy(show, COPY_SIZES.thumb) })
    } catch {
      return fail({ kind: 'wrongPicture' })
    }
  })
}
