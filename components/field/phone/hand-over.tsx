'use client'

import { FileDown } from 'lucide-react'
import { useState } from 'react'
import { useStamp } from '@/components/store/use-stamp'
import { useUnsent } from '@/components/store/use-unsent'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { handedWords } from './let-go-words'
import { handToBrowser, makeFiles, type NamedFile } from './save-files'

export type HandingOver = {
  /** All files of this handing over; null before the first press. */
  files: readonly NamedFile[] | null
  /** Names of those that went to the browser. */
  handed: readonly string[]
  /** Makes the files and hands over the first. */
  begin(): Promise<void>
  /** Hands over one of them. */
  hand(file: NamedFile): void
}

/** Handing unsent work to the browser as files, one for each press. */
export function useHandingOver(): HandingOver {
  const unsent = useUnsent()
  const stamp = useStamp()
  const [files, setFiles] = useState<readonly NamedFile[] | null>(null)
  const [handed, setHanded] = useState<readonly string[]>([])
  const say = (names: readonly string[], all: readonly NamedFile[]) => {
    setHanded(names)
    announce(handedWords(names, all.length))
  }
  return {
    files,
    handed,
    begin: async () => {
      const made = await makeFiles(unsent, stamp.now())
      setFiles(made)
      const [first] = made
      if (first === undefined) return
      handToBrowser(first)
      say([first.name], made)
    },
    hand: (file) => {
      handToBrowser(file)
      say([...handed.filter((name) => name !== file.name), file.name], files ?? [])
    },
  }
}

/** True when every file went to the browser. */
export const isAllHanded = ({ files, handed }: Pick<HandingOver, 'files' | 'handed'>): boolean =>
  files !== null && files.length > 0 && files.every(({ name }) => handed.includes(name))

/** What went to the browser, and a key for each file when there are several. `after` follows the words. */
export function HandedFiles({ handing, after = '' }: { handing: HandingOver; after?: string }) {
  const { files, handed, hand } = handing
  if (files === null || handed.length === 0) return null
  return (
    <>
      <p className="text-second font-bold">
        {handedWords(handed, files.length)} {after}
      </p>
      {files.length > 1
        ? files.map((file, index) => (
            <Key key={file.name} small quiet onClick={() => hand(file)}>
              <FileDown aria-hidden="true" strokeWidth={2.5} />
              File {index + 1} of {files.length}
              {handed.includes(file.name) ? ' once more' : ''}
            </Key>
          ))
        : null}
    </>
  )
}
