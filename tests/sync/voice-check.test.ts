import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { readMp4 } from '@/lib/sync/server/media-mp4'
import { readOgg } from '@/lib/sync/server/media-ogg'
import { checkVoice, voiceMime } from '@/lib/sync/server/media-voice'
import { readWebm } from '@/lib/sync/server/media-webm'
import { jpegOf } from '../support/pictures'
import { mp4Of, oggOf, webmOf } from '../support/voices'

const check = (bytes: Buffer) => checkVoice(bytes, createHash('sha256').update(bytes).digest('hex'))
const refused = (kind: string) => ({ ok: false, problem: { kind } })

describe('voice notes', () => {
  it('[PH4] reads how long each container is', () => {
    expect(readWebm(webmOf({ seconds: 22 }))?.seconds).toBeCloseTo(22, 1)
    expect(readOgg(oggOf({ seconds: 22 }))?.seconds).toBeCloseTo(22, 1)
    expect(readMp4(mp4Of({ seconds: 22 }))?.seconds).toBeCloseTo(22, 1)
    expect(readMp4(mp4Of({ seconds: 22, fragmented: true }))?.seconds).toBeCloseTo(22, 1)
  })

  it('[PH4] takes 60 s in each container and refuses what runs on', () => {
    for (const make of [webmOf, oggOf, mp4Of]) {
      expect(check(make({ seconds: 60 })).ok).toBe(true)
      expect(check(make({ seconds: 63 }))).toEqual(refused('wrongVoice'))
    }
    expect(check(mp4Of({ seconds: 63, fragmented: true }))).toEqual(refused('wrongVoice'))
  })

  it('[PH4] refuses pictures, films, other sound and other hashes', () => {
    expect(check(jpegOf())).toEqual(refused('wrongVoice'))
    expect(check(webmOf({ seconds: 5, tracks: [1, 2] }))).toEqual(refused('wrongVoice'))
    expect(check(webmOf({ seconds: 5, tracks: [1] }))).toEqual(refused('wrongVoice'))
    expect(check(webmOf({ seconds: 5, docType: 'matroska' }))).toEqual(refused('wrongVoice'))
    expect(check(oggOf({ seconds: 5, codec: 'theora##' }))).toEqual(refused('wrongVoice'))
    expect(check(oggOf({ seconds: 5, secondStream: true }))).toEqual(refused('wrongVoice'))
    expect(check(mp4Of({ seconds: 5, handlers: ['soun', 'vide'] }))).toEqual(refused('wrongVoice'))
    expect(checkVoice(oggOf({ seconds: 5 }), '0'.repeat(64))).toEqual(refused('wrongHash'))
  })

  it('[R22] refuses a recording that says where it was made', () => {
    expect(check(mp4Of({ seconds: 5, place: true }))).toEqual(refused('hasPosition'))
  })

  it('[PH4] loses its way in no cut and no bent file', () => {
    const whole = [
      webmOf({ seconds: 3 }),
      oggOf({ seconds: 3 }),
      mp4Of({ seconds: 3, fragmented: true }),
    ]
    for (const file of whole) {
      const mime = voiceMime(file)
      for (let length = 0; length < file.length; length += 7) check(file.subarray(0, length))
      for (let at = 0; at < Math.min(file.length, 600); at++) {
        const bent = Buffer.from(file)
        bent[at] = 0xff
        check(bent)
      }
      expect(mime).not.toBeNull()
      expect(check(file).ok).toBe(true)
    }
  })
})
