import { isIPv4, isIPv6 } from 'node:net'

/**
 * Answers the network address a request came from, as a key for the brake on tries. `forwarded` is the
 * header `x-forwarded-for`: the last address in it is the one our own proxy put there; those before it are
 * the client's word, and without a proxy the last one is too (decision 003). Of an IPv6 address the first
 * 64 bits, since one household holds all the rest. `unknown` when there is none: those share one brake.
 */
export function clientAddress(forwarded: unknown): string {
  if (typeof forwarded !== 'string') return 'unknown'
  const last = (forwarded.split(',').at(-1) ?? '').trim().toLowerCase()
  const v4 = /^(?:::ffff:)?([0-9.]+)$/.exec(last)?.[1]
  if (v4 !== undefined && isIPv4(v4)) return v4
  return isIPv6(last) ? `${firstGroups(last).join(':')}::/64` : 'unknown'
}

/** The first four groups of an IPv6 address, `::` written out (RFC 4291, section 2.2). */
function firstGroups(address: string): string[] {
  const [head = '', tail] = address.replace(/%.*$/, '').split('::')
  const groups = (text: string) => (text === '' ? [] : text.split(':'))
  const before = groups(head)
  if (tail === undefined) return before.slice(0, 4).map(short)
  const after = groups(tail)
  const width = (list: string[]) => list.length + (list.at(-1)?.includes('.') ? 1 : 0)
  const gap = Math.max(0, 8 - width(before) - width(after))
  return [...before, ...Array<string>(gap).fill('0'), ...after].slice(0, 4).map(short)
}

const short = (group: string) => group.replace(/^0+(?=.)/, '')
