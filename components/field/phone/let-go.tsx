'use client'

import { FileDown } from 'lucide-react'
import { useState } from 'react'
import { useStamp } from '@/components/store/use-stamp'
import { type UnsentItem, useUnsent } from '@/components/store/use-unsent'
import { announce } from '@/components/ui/announce'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import { handedWords, letGoWords } from './let-go-words'
import { handFilesOver } from './save-files'

type Props = { item: UnsentItem; name: string; failed: () => void }

/**
 * Letting something stuck go, in two steps (P16): the file is handed to the browser; then the person,
 * who alone can see that it is there, says so. The browser tells nobody whether a download was kept,
 * and of a photo or voice note the file is all that is left.
 */
export function LetGo({ item, name, failed }: Props) {
  const unsent = useUnsent()
  const stamp = useStamp()
  const [files, setFiles] = useState<readonly string[] | null>(null)
  const handOver = async () => {
    const names = await handFilesOver(unsent, stamp.now())
    setFiles(names)
    announce(handedWords(names))
  }
  const letGo = async () => {
    await unsent.letGo(item)
    announce(`${name} let go.`)
  }
  const words = letGoWords(item, name, files ?? [])
  return (
    <>
      <Key small onClick={() => void handOver().catch(failed)}>
        <FileDown aria-hidden="true" strokeWidth={2.5} />
        {files === null ? 'Let go: the file first' : 'The file once more'}
      </Key>
      {files === null ? null : (
        <>
          <p className="text-second font-bold">{handedWords(files)}</p>
          <p className="text-second">{words.after}</p>
          <Hold
            label={words.label}
            question={words.question}
            confirmLabel="It is there, let go"
            onConfirm={() => void letGo().catch(failed)}
          />
        </>
      )}
    </>
  )
}
