'use client'

import { FileDown } from 'lucide-react'
import { type UnsentItem, useUnsent } from '@/components/store/use-unsent'
import { announce } from '@/components/ui/announce'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import { HandedFiles, isAllHanded, useHandingOver } from './hand-over'
import { letGoWords } from './let-go-words'

type Props = { item: UnsentItem; name: string; failed: () => void }

/**
 * Letting something stuck go, in two steps (P16): the file is handed to the browser; then the person,
 * who alone can see that it is there, says so. The browser tells nobody whether a download was kept,
 * and of a photo or voice note the file is all that is left.
 */
export function LetGo({ item, name, failed }: Props) {
  const unsent = useUnsent()
  const handing = useHandingOver()
  const letGo = async () => {
    await unsent.letGo(item)
    announce(`${name} let go.`)
  }
  const words = letGoWords(item, name, handing.handed)
  return (
    <>
      <Key small onClick={() => void handing.begin().catch(failed)}>
        <FileDown aria-hidden="true" strokeWidth={2.5} />
        {handing.files === null ? 'Let go: the file first' : 'Make the file once more'}
      </Key>
      <HandedFiles handing={handing} />
      {isAllHanded(handing) ? (
        <>
          <p className="text-second">{words.after}</p>
          <Hold
            label={words.label}
            question={words.question}
            confirmLabel="It is there, let go"
            onConfirm={() => void letGo().catch(failed)}
          />
        </>
      ) : null}
    </>
  )
}
