'use client'

import { useState } from 'react'
import { size } from '@/components/field/times'
import { Key } from '@/components/ui/key'
import { LogIcon } from '@/components/ui/log-icon'
import type { PhotoRef } from '@/lib/model/photo'

type Props = { photo: PhotoRef; caption: string | null; here: boolean }

/**
 * The picture once the shop has its bytes; until then its frame with the words that it is still on the
 * phone. At night it is dimmed until pressed.
 */
export function PhotoFrame({ photo, caption, here }: Props) {
  const [bright, setBright] = useState(false)
  const [failed, setFailed] = useState(false)
  if (here && failed) {
    return (
      <p className="desk-photo-missing">
        <LogIcon shape="frame" className="size-8 shrink-0" />
        <span className="min-w-0 flex-1">The photo is at the shop but could not be loaded.</span>
        <Key small={true} quiet={true} onClick={() => setFailed(false)}>
          Try again
        </Key>
      </p>
    )
  }
  if (!here) {
    return (
      <p className="desk-photo-missing">
        <LogIcon shape="frame" className="size-8 shrink-0" />
        <span>
          <strong>Photo still on the phone</strong>, {size(photo.bytes)}. It comes after the words.
        </span>
      </p>
    )
  }
  return (
    <button
      type="button"
      aria-pressed={bright}
      onClick={() => setBright(!bright)}
      className={bright ? 'desk-photo desk-photo-bright' : 'desk-photo'}
    >
      {/* biome-ignore lint/performance/noImgElement: bytes by hash behind the session; no optimiser may cache them */}
      <img
        src={`/api/photos/${photo.hash}`}
        width={photo.width}
        height={photo.height}
        alt={caption ?? 'Photo without a caption'}
        loading="lazy"
        onError={() => setFailed(true)}
      />
    </button>
  )
}
