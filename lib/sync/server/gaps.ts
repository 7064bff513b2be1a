import type { ShopTx } from '@/db/client'
import { type Device, deviceGaps, noteGaps } from '@/db/queries/devices'
import type { Claim } from './signed-request'

/** Most holes told at once; the phone hears of the rest after it filled these. */
const MOST_TOLD = 100
/** Holes that the phone cannot fill are told again no more often than this (a choice). */
const TELL_EVERY_MS = 3_600_000

/**
 * Holes in a phone's numbers that the shop never saw, `[first, last]` each (P22). They are looked for when
 * a push skips numbers, and while some are known: with each push, else once an hour, so that an exchange
 * with nothing to tell costs nothing.
 */
export async function missingNumbers(
  tx: ShopTx,
  of: { device: Device; dseq: Claim['dseq']; ops: number; now: number },
): Promise<[number, number][]> {
  const { device, dseq, ops, now } = of
  const toldAt = device.gapsToldAt === null ? null : Date.parse(device.gapsToldAt)
  const isDue = toldAt !== null && (ops > 0 || now - toldAt > TELL_EVERY_MS)
  if (!isDue && !skips(device.highestDseq, dseq, ops)) return []
  const gaps = await deviceGaps(tx, device.id)
  const next = gaps.length === 0 ? null : new Date(now).toISOString()
  if (next !== null || device.gapsToldAt !== null) {
    await noteGaps(tx, { id: device.id, toldAt: next })
  }
  return gaps.slice(0, MOST_TOLD).map(({ first, last }): [number, number] => [first, last])
}

/** True when numbers lie between what came before and this push, or are missing within it. */
function skips(highest: number, dseq: Claim['dseq'], ops: number): boolean {
  if (dseq === null || dseq.last <= highest) return false
  return dseq.first > highest + 1 || dseq.last - dseq.first + 1 > ops
}
