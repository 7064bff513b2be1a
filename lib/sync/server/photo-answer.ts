import type { CopySize } from './photo-copies'
import type { ShownPhoto } from './photos'

/** `?size=` of a photo's address; the original when it is left out, as phones of the version before ask. */
export function sizeOf(url: string): CopySize | 'original' {
  const size = new URL(url).searchParams.get('size')
  return size === 'thumb' || size === 'show' ? size : 'original'
}

const HEADERS = {
  'x-content-type-options': 'nosniff',
  'cache-control': 'private, max-age=31536000, immutable',
  // On a shared phone: what was kept for one session is not shown under another (fault 12).
  vary: 'cookie',
  'content-security-policy': "default-src 'none'; sandbox",
  'content-disposition': 'inline',
  'accept-ranges': 'bytes',
}

/** First and last byte of one range (RFC 9110, 14.1.2); null for the whole, `outside` when there is none. */
function rangeOf(
  header: string | null,
  size: number,
): { first: number; last: number } | 'outside' | null {
  const match = /^bytes=(\d*)-(\d*)$/.exec(header ?? '')
  const [, from = '', to = ''] = match ?? []
  if (from === '' && to === '') return null
  const first = from === '' ? Math.max(0, size - Number(to)) : Number(from)
  const last = from === '' || to === '' ? size - 1 : Math.min(Number(to), size - 1)
  return first > last ? 'outside' : { first, last }
}

/** The bytes, or the range of them that was asked for: players of sound ask for ranges. */
export function photoAnswer({ bytes, mime }: ShownPhoto, range: string | null): Response {
  const asked = rangeOf(range, bytes.length)
  if (asked === 'outside') {
    const headers = { ...HEADERS, 'content-range': `bytes */${bytes.length}` }
    return new Response(null, { status: 416, headers })
  }
  const headers = { ...HEADERS, 'content-type': mime }
  if (asked === null) return new Response(bytes, { headers })
  const { first, last } = asked
  return new Response(bytes.subarray(first, last + 1), {
    status: 206,
    headers: { ...headers, 'content-range': `bytes ${first}-${last}/${bytes.length}` },
  })
}
