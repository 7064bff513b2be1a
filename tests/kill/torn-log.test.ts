import { expect, it } from 'vitest'
import { wholeEnd } from './torn-log'

const [FULL, FIRST, MIDDLE, LAST] = [1, 2, 3, 4] as const
const record = (type: number, length: number) => {
  const head = Buffer.alloc(7, 9)
  head.writeUInt16LE(length, 4)
  head[6] = type
  return Buffer.concat([head, Buffer.alloc(length, type)])
}

it.each([
  ['nothing', [], 0],
  ['whole records', [record(FULL, 10), record(FULL, 300)], 0],
  ['one over three blocks', [record(FIRST, 32_761), record(MIDDLE, 32_761), record(LAST, 5)], 0],
  ['a block filled up with zeros', [record(FULL, 32_756), Buffer.alloc(5), record(FULL, 4)], 0],
  ['half a header', [record(FULL, 10), record(FULL, 20).subarray(0, 4)], 4],
  ['a header without its data', [record(FULL, 10), record(FULL, 20).subarray(0, 7)], 7],
  ['half its data', [record(FULL, 10), record(FULL, 20).subarray(0, 15)], 15],
  ['a first part without its last', [record(FULL, 32_000), record(FIRST, 754)], 761],
])('[P1] finds where the last whole record ends: %s', (_, parts, torn) => {
  const log = Buffer.concat(parts as Buffer[])
  expect(wholeEnd(log)).toBe(log.length - torn)
})
