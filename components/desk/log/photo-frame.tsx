'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import { LogIcon } from '@/components/ui/log-icon'
import type { PhotoRef } from '@/lib/model/photo'

type Props = { photo: PhotoRef; caption: string | null }

/** Longest edge of the shop's small copy, and of the one that fills the column (photo-copies.ts). */
const EDGE = { thumb: 320, show: 1600 }

/** A small copy at once; pressed, the whole picture. At night it is dimmed until pressed. */
export function PhotoFrame({ photo, caption }: Props) {
  const [whole, setWhole] = useState(false)
  const [failed, setFailed] = useState(false)
  const size = whole ? 'show' : 'thumb'
  const share = Math.min(1, EDGE[size] / Math.max(photo.width, photo.height))
  if (failed) {
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
  return (
    <>
      <button
        type="button"
        aria-pressed={whole}
        title={whole ? 'Make it small' : 'Show it whole'}
        onClick={() => setWhole(!whole)}
        className={whole ? 'desk-photo desk-photo-whole' : 'desk-photo'}
      >
        {/* biome-ignore lint/performance/noImgElement: bytes by hash behind the session; no optimiser may cache them */}
        <img
          src={`/api/photos/${photo.hash}?size=${size}`}
          width={Math.round(photo.width * share)}
          height={Math.round(photo.height * share)}
          alt={caption ?? 'Photo without a caption'}
          loading="lazy"
          onError={() => setFailed(true)}
        />
      </button>
      {whole ? (
        <a href={`/api/photos/${photo.hash}`} target="_blank" rel="noreferrer">
          The original, {photo.width} × {photo.height}
        </a>
      ) : null}
    </>
  )
}
