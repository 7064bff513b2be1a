'use client'

import { Key, KeyLink } from '@/components/ui/key'
import { jobHref } from '../route'

type Props = {
  jobId: string
  words: string
  /** Given on the screen of the codes itself, where a link would lead nowhere. */
  onTakeDown?: () => void
}

/** Leads to the form where codes are taken down and opens it (`?more`), or opens it where it is. */
export function TakeDownKey({ jobId, words, onTakeDown }: Props) {
  return onTakeDown ? (
    <Key onClick={onTakeDown}>{words}</Key>
  ) : (
    <KeyLink href={`${jobHref(jobId, 'codes')}?more`}>{words}</KeyLink>
  )
}
