'use client'

import { useEffect, useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { usePhone, usePorts } from '@/components/store/store-provider'
import { useDraft } from '@/components/store/use-draft'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { DraftSign } from '@/components/ui/draft-sign'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { Photo } from '@/components/ui/photo'
import { Screen } from '@/components/ui/screen'
import type { TakenPhoto } from '@/lib/ports/camera'
import { OfJob } from '../of-job'
import { jobHref } from '../route'
import { useRoute } from '../router'
import { size } from '../times'
import { CAMERA_WORDS, PhotoKey, photoBody, photoToKeep } from './photo-key'
import { heldPhotos } from './taken-held'

type Shown = { photo: TakenPhoto; url: string }

/** One photo with a caption: made small, without position data, kept with its entry. */
export function PhotoScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{({ job }) => <TakePhoto jobId={job.id} />}</OfJob>
}

function TakePhoto({ jobId }: { jobId: string }) {
  const key = `job.${jobId}.photo`
  const { value: caption, set, kept } = useDraft<string>(key, '')
  const { shown, busy, problem, take, letGo } = useTakenPhoto(jobId)
  const { save, saving, problem: notSaved } = useSave()
  const stamp = useStamp()
  const { go, here } = useRoute()
  const keep = async ({ photo }: Shown) => {
    const words = caption.trim()
    const kept = await save([stamp.entry(jobId, photoBody(photo, caption))], {
      photos: [photoToKeep(jobId, photo)],
      clearDrafts: [key],
      // The words are kept, though the picture has no room (P21).
      wordsAlone: words === '' ? [] : [stamp.entry(jobId, { kind: 'note', words })],
    })
    if (!kept) return
    letGo()
    announce('Photo saved on this phone.')
    go(jobHref(jobId, 'log'), { replace: true, from: here })
  }
  return (
    <Screen
      title="Photo"
      second="Position data in the picture is taken out."
      foot={
        shown === null ? null : (
          <Key kind="main" disabled={saving} onClick={() => keep(shown)}>
            Save photo
          </Key>
        )
      }
    >
      {shown === null ? null : <NotSavedYet shown={shown} />}
      <PhotoKey
        words={shown === null ? 'Take a photo' : 'Take it again'}
        plate={shown === null}
        busy={busy}
        onFile={take}
      />
      <p role="status" className="font-bold text-nogo empty:hidden">
        {problem}
      </p>
      <NotSaved problem={notSaved} />
      <Field
        label="Caption"
        value={caption}
        onChange={set}
        maxLength={300}
        autoCapitalize="sentences"
      />
      <DraftSign kept={kept} />
    </Screen>
  )
}

function NotSavedYet({ shown }: { shown: Shown }) {
  return (
    <figure>
      <Photo url={shown.url} alt="What was just taken" className="w-full" />
      <figcaption className="pt-1 text-second text-ink2">
        {shown.photo.width} × {shown.photo.height}, {size(shown.photo.bytes.byteLength)}. Not saved
        yet: it is held while the app stays open.
      </figcaption>
    </figure>
  )
}

/** A picked file made into a photo that can be kept, with an address to look at it; held until it is saved. */
function useTakenPhoto(jobId: string) {
  const { camera } = usePorts()
  const key = `${usePhone()?.actor.personId} ${jobId}`
  const [shown, setShown] = useState<Shown | null>(() => shownOf(heldPhotos.get(key)))
  const [busy, setBusy] = useState<boolean>(false)
  const [problem, setProblem] = useState<string | null>(null)
  const url = shown?.url ?? null
  useEffect(() => () => (url === null ? undefined : URL.revokeObjectURL(url)), [url])
  const ready = async (file: File) => {
    const photo = await camera.ready(file)
    if (!photo.ok) {
      setProblem(CAMERA_WORDS[photo.problem.kind])
      return
    }
    heldPhotos.set(key, photo.value)
    setShown(shownOf(photo.value))
  }
  const take = (file: File) => {
    setBusy(true)
    setProblem(null)
    ready(file)
      .catch(() => setProblem(CAMERA_WORDS.notReadable))
      .finally(() => setBusy(false))
  }
  return { shown, busy, problem, take, letGo: () => heldPhotos.set(key, null) }
}

const shownOf = (photo: TakenPhoto | null): Shown | null =>
  photo && {
    photo,
    url: URL.createObjectURL(new Blob([photo.bytes], { type: photo.mime })),
  }
