'use client'

import { useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { usePorts } from '@/components/store/store-provider'
import { usePhoto } from '@/components/store/use-photo'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Photo } from '@/components/ui/photo'
import { CAMERA_WORDS, PhotoKey, photoBody, photoToKeep } from '../log/photo-key'

type Props = { jobId: string; hash: string | null; onTaken: (hash: string) => void }

/** A photo of what the dash shows (rule R11). It is recorded at once, so that nothing can take it back. */
export function DashPhoto({ jobId, hash, onTaken }: Props) {
  const { camera } = usePorts()
  const { save, problem: notSaved } = useSave()
  const stamp = useStamp()
  const [busy, setBusy] = useState<boolean>(false)
  const [problem, setProblem] = useState<string | null>(null)
  const take = async (file: File) => {
    const photo = await camera.ready(file)
    if (!photo.ok) {
      setProblem(CAMERA_WORDS[photo.problem.kind])
      return
    }
    const entry = stamp.entry(jobId, photoBody(photo.value, 'The dash, showing codes'))
    if (!(await save([entry], { photos: [photoToKeep(jobId, photo.value)] }))) return
    announce('Photo saved on this phone.')
    onTaken(photo.value.hash)
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
            .catch(() => setProblem(CAMERA_WORDS.notReadable))
            .finally(() => setBusy(false))
        }}
      />
      <p role="status" className="font-bold text-nogo empty:hidden">
        {problem}
      </p>
      <NotSaved problem={notSaved} />
      {hash === null ? null : <Taken hash={hash} />}
    </div>
  )
}

function Taken({ hash }: { hash: string }) {
  const { thumb: url } = usePhoto(hash)
  return url === null ? null : (
    <Photo url={url} alt="The dash, as photographed for this code" className="max-h-40" />
  )
}
