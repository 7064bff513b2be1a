'use client'

import { Camera as CameraIcon } from 'lucide-react'
import type { NewPhoto } from '@/components/store/use-record'
import { classes } from '@/components/ui/class-names'
import type { LogBody } from '@/lib/model/log-entry'
import type { CameraProblem, TakenPhoto } from '@/lib/ports/camera'

/** Why a picture cannot be kept, in a sentence. */
export const CAMERA_WORDS: Record<CameraProblem['kind'], string> = {
  notReadable: 'This phone cannot open that picture. Take it again.',
  tooBig: 'That picture cannot be made small enough to keep. Take it again.',
}

/** What the phone keeps of a taken photo beside its entry. */
export const photoToKeep = (jobId: string, { hash, bytes, mime, thumb }: TakenPhoto): NewPhoto => ({
  hash,
  jobId,
  bytes,
  mime,
  thumb,
})

/** What the log keeps of a taken photo; the bytes travel apart. */
export function photoBody(photo: TakenPhoto, caption: string): LogBody {
  const { bytes, thumb: _thumb, ...about } = photo
  return {
    kind: 'photo',
    photo: { ...about, bytes: bytes.byteLength },
    caption: caption.trim() === '' ? null : caption.trim(),
  }
}

type Props = { words: string; plate: boolean; busy: boolean; onFile: (file: File) => void }

/** The key that opens the phone's camera. */
export function PhotoKey({ words, plate, busy, onFile }: Props) {
  return (
    <label className={classes('key relative w-full', plate && 'key-plate')}>
      <CameraIcon aria-hidden="true" strokeWidth={2.5} />
      {busy ? 'Making it small' : words}
      <input
        type="file"
        accept="image/*"
        capture="environment"
        disabled={busy}
        className="absolute inset-0 cursor-pointer opacity-0"
        onChange={(e) => {
          const file = e.target.files?.[0]
          if (file) {
            onFile(file)
          }
          e.target.value = ''
        }}
      />
    </label>
  )
}
