// Small voice notes, made byte by byte: the containers a browser's recorder writes, with empty sound.

const id = (hex: string) => Buffer.from(hex, 'hex')

/** An EBML element; `size` unknown when asked, as a live recorder writes its containers. */
function ebml(name: string, body: Buffer, unknown = false): Buffer {
  const size = Buffer.alloc(8)
  size.writeUInt32BE(0x01000000, 0)
  size.writeUInt32BE(body.length, 4)
  return Buffer.concat([id(name), unknown ? id('01ffffffffffffff') : size, body])
}

const uint = (value: number, length = 2) => {
  const out = Buffer.alloc(length)
  out.writeUIntBE(value, 0, length)
  return out
}

/** WebM (RFC 8794, RFC 9559) with a block every 100 ms and a cluster every 10 s, sizes unknown. */
export function webmOf(parts: {
  seconds: number
  tracks?: number[]
  docType?: string
  noise?: string
}) {
  const tracks = (parts.tracks ?? [2]).map((type) => ebml('ae', ebml('83', uint(type, 1))))
  const clusters: Buffer[] = []
  for (let from = 0; from <= parts.seconds * 1000; from += 10_000) {
    const blocks: Buffer[] = [ebml('e7', uint(from, 4))]
    for (let at = 0; at < 10_000 && from + at <= parts.seconds * 1000; at += 100) {
      const block = Buffer.alloc(24)
      block[0] = 0x81
      block.writeInt16BE(at, 1)
      block.write(parts.noise ?? '', 4, 'latin1')
      blocks.push(ebml('a3', block))
    }
    clusters.push(ebml('1f43b675', Buffer.concat(blocks), true))
  }
  return Buffer.concat([
    ebml('1a45dfa3', ebml('4282', Buffer.from(parts.docType ?? 'webm'))),
    ebml(
      '18538067',
      Buffer.concat([
        ebml('1549a966', ebml('2ad7b1', uint(1_000_000, 3))),
        ebml('1654ae6b', Buffer.concat(tracks)),
        ...clusters,
      ]),
      true,
    ),
  ])
}

/** Ogg Opus (RFC 3533, RFC 7845), one page a second. */
export function oggOf(parts: { seconds: number; codec?: string; secondStream?: boolean }): Buffer {
  const page = (of: { body: Buffer; granule: bigint; serial?: number }) => {
    const head = Buffer.alloc(28)
    head.write('OggS', 0, 'latin1')
    head.writeBigInt64LE(of.granule, 6)
    head.writeUInt32LE(of.serial ?? 7, 14)
    head[26] = 1
    head[27] = of.body.length
    return Buffer.concat([head, of.body])
  }
  const head = Buffer.alloc(19)
  head.write(parts.codec ?? 'OpusHead', 0, 'latin1')
  head.writeUInt16LE(312, 10)
  const pages = [page({ body: head, granule: 0n })]
  for (let second = 1; second <= parts.seconds; second++) {
    const granule = BigInt(second * 48_000 + 312)
    pages.push(page({ body: Buffer.alloc(9), granule, serial: parts.secondStream ? second : 7 }))
  }
  return Buffer.concat(pages)
}

function box(name: string, ...bodies: Buffer[]): Buffer {
  const body = Buffer.concat(bodies)
  const head = Buffer.alloc(8)
  head.writeUInt32BE(body.length + 8, 0)
  head.write(name, 4, 'latin1')
  return Buffer.concat([head, body])
}

const words = (...values: number[]) => Buffer.concat(values.map((value) => uint(value, 4)))

/** MP4 (ISO/IEC 14496-12): whole, or in fragments of a second as a live recorder writes it. */
export function mp4Of(parts: {
  seconds: number
  handlers?: string[]
  fragmented?: boolean
  place?: boolean
}): Buffer {
  const { seconds, handlers = ['soun'], fragmented = false } = parts
  const traks = handlers.map((handler) =>
    box(
      'trak',
      box(
        'mdia',
        box('mdhd', words(0, 0, 0, 48_000, 0, 0)),
        box('hdlr', words(0, 0), Buffer.from(handler, 'latin1'), words(0, 0, 0)),
      ),
    ),
  )
  const movie = box(
    'moov',
    box('mvhd', words(0, 0, 0, 1000, fragmented ? 0 : seconds * 1000), Buffer.alloc(80)),
    ...traks,
    ...(fragmented ? [box('mvex', box('trex', words(0, 1, 1, 1024, 0, 0)))] : []),
    ...(parts.place ? [box('udta', box('\u00a9xyz', Buffer.from('+47.1-093.2/')))] : []),
  )
  const fragment = box(
    'moof',
    box('traf', box('tfhd', words(0x8, 1, 480)), box('trun', words(0, 100))),
  )
  return Buffer.concat([
    box('ftyp', Buffer.from('M4A \0\0\0\0')),
    movie,
    ...(fragmented ? Array.from({ length: seconds }, () => fragment) : []),
    box('mdat', Buffer.alloc(40)),
  ])
}
