'use client'

import { FileDown, Lock } from 'lucide-react'
import { useEffect, useRef, useState } from 'react'
import { useSigningOut } from '@/components/store/use-sign-out'
import { announce } from '@/components/ui/announce'
import { Caution } from '@/components/ui/caution'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import { counted } from '../words'
import { HandedFiles, useHandingOver } from './hand-over'

type Stage =
  | { is: 'ready' }
  | { is: 'calling' }
  | { is: 'asking'; unsent: number }
  | { is: 'deleting'; unsent: number }

/**
 * Signing out. The shop is called once more; what is still unsent then is the person's to decide on: stay,
 * carry it out as a file, leave it locked here, or, by a second step that names the count, delete it.
 */
export function SignOutPart() {
  const [stage, setStage] = useState<Stage>({ is: 'ready' })
  const [trouble, setTrouble] = useState<string | null>(null)
  const { tryToSend, signOut } = useSigningOut()
  const failed = () => {
    setStage({ is: 'ready' })
    setTrouble('That did not work. Everything is still on this phone.')
  }
  const begin = async () => {
    setTrouble(null)
    setStage({ is: 'calling' })
    const unsent = await tryToSend()
    if (unsent === 0) await signOut()
    else setStage({ is: 'asking', unsent })
  }
  const stay = () => setStage({ is: 'ready' })
  return (
    <>
      {trouble === null ? null : (
        <p role="alert" className="font-bold text-nogo">
          {trouble}
        </p>
      )}
      {stage.is === 'ready' || stage.is === 'calling' ? (
        <Key disabled={stage.is === 'calling'} onClick={() => void begin().catch(failed)}>
          {stage.is === 'calling' ? 'Calling the shop' : 'Sign out'}
        </Key>
      ) : stage.is === 'asking' ? (
        <Asking
          unsent={stage.unsent}
          onStay={stay}
          onLock={() => void signOut().catch(failed)}
          onDelete={() => setStage({ is: 'deleting', unsent: stage.unsent })}
        />
      ) : (
        <Deleting
          unsent={stage.unsent}
          onStay={stay}
          onOther={() => void begin().catch(failed)}
          onFailed={failed}
        />
      )}
    </>
  )
}

/** What is asked of comes into view and is read from its first words. */
function useFocused<E extends HTMLElement>() {
  const box = useRef<E>(null)
  useEffect(() => box.current?.focus(), [])
  return box
}

function Asking(of: {
  unsent: number
  onStay: () => void
  onLock: () => void
  onDelete: () => void
}) {
  const box = useFocused<HTMLHeadingElement>()
  const [news, setNews] = useState<string | null>(null)
  const handing = useHandingOver()
  return (
    <section aria-labelledby="sign-out-title" className="grid gap-3 border-2 border-ink p-3">
      <h2 id="sign-out-title" ref={box} tabIndex={-1} className="text-row font-bold">
        {counted(of.unsent, 'thing')} not sent
      </h2>
      <p>The shop could not take it now. It is saved on this phone. What is to become of it?</p>
      <p role="status" className="font-bold empty:hidden">
        {news}
      </p>
      <HandedFiles handing={handing} after="It stays unsent here until the shop has it." />
      <Key kind="plate" onClick={of.onStay}>
        Stay signed in
      </Key>
      <Key
        onClick={() => {
          handing.begin().catch(() => setNews('The file could not be made. Everything is kept.'))
        }}
      >
        <FileDown aria-hidden="true" strokeWidth={2.5} />
        Hand over by file
      </Key>
      <Key onClick={of.onLock}>
        <Lock aria-hidden="true" strokeWidth={2.5} />
        Sign out, keep it locked here
      </Key>
      <p className="text-second text-ink2">
        Locked, nobody else sees it on this phone, and it is sent under no other name. It opens when
        you sign in here again.
      </p>
      <Key small quiet onClick={of.onDelete}>
        Delete it instead
      </Key>
    </section>
  )
}

function Deleting(of: {
  unsent: number
  onStay: () => void
  onOther: () => void
  onFailed: () => void
}) {
  const box = useFocused<HTMLHeadingElement>()
  const { signOutAndDelete } = useSigningOut()
  const erase = async () => {
    if (await signOutAndDelete(of.unsent)) return
    announce('The count has changed. Nothing was deleted.', 'assertive')
    of.onOther()
  }
  return (
    <section aria-labelledby="delete-title" className="grid gap-3 border-2 border-nogo p-3">
      <h2 id="delete-title" ref={box} tabIndex={-1} className="text-row font-bold">
        Delete {counted(of.unsent, 'thing')} for good?
      </h2>
      <Caution signal="NOTICE">
        The shop never had {of.unsent === 1 ? 'it' : 'them'}. Nobody can bring{' '}
        {of.unsent === 1 ? 'it' : 'them'} back, and the shop will see that you deleted{' '}
        {counted(of.unsent, 'unsent thing')}.
      </Caution>
      <Key kind="plate" onClick={of.onStay}>
        Keep everything
      </Key>
      <Hold
        label={`Delete ${of.unsent} and sign out`}
        question={`Delete ${counted(of.unsent, 'unsent thing')} from this phone for good?`}
        confirmLabel={`Delete ${of.unsent}`}
        onConfirm={() => void erase().catch(of.onFailed)}
      />
    </section>
  )
}
