'use client'

import { useState } from 'react'
import { usePorts } from '@/components/store/store-provider'
import { usePhoto } from '@/components/store/use-photo'
import { useRecord } from '@/components/store/use-record'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Photo } from '@/components/ui/photo'
import { CAMERA_WORDS, PhotoKey, photoBody } from '../log/photo-key'

type Props = { jobId: string; hash: string | null; onTaken: (hash: string) => void }

/** A photo of what the dash shows (rule R11). It is recorded at once, so that nothing can take it back. */
export function DashPhoto({ jobId, hash, onTaken }: Props) {
  const { camera } = usePorts()
  const record = useRecord()
  const stamp = useStamp()
  const [busy, setBusy] = useState<boolean>(false)
  const [problem, setProblem] = useState<string | null>(null)
  const take = async (file: File) => {
    const photo = await camera.ready(file)
    if (!photo.ok) {
      setProblem(CAMERA_WORDS[photo.problem.kind])
      return
    }
    const { hash: taken, bytes, mime } = photo.value
    await record([stamp.entry(jobId, photoBody(photo.value, 'The dash, showing codes'))], {
      photos: [{ hash: taken, jobId, bytes, mime }],
    })
    announce('Photo saved on this phone.')
    onTaken(taken)
  }
  return (
    <div className="grid gap-2">
      <PhotoKey
        words={hash === null ? 'Photo of the dash' : 'Another photo of it'}
        plate={false}
        busy={busy}
        onFile={(file) => {
          setBusy(true)
          setProblem(null)
          take(file)
            .catch(() => setProblem('The photo could not be saved. Try again.'))
            .finally(() => setBusy(false))
        }}
      />
      <p role="status" className="font-bold text-nogo empty:hidden">
        {problem}
      </p>
      {hash === null ? null : <Taken hash={hash} />}
    </div>
  )
}

function Taken({ hash }: { hash: string }) {
  const { url } = usePhoto(hash)
  return url === null ? null : (
    <Photo url={url} alt="The dash, as photographed for this code" className="max-h-40" />
  )
}
