import type { UnsentItem } from '@/components/store/use-unsent'
import { counted } from '../words'

/** Names in a row: "a", "a and b", "a, b and c". */
const listed = (names: readonly string[]): string =>
  names.length < 2
    ? (names[0] ?? 'the file')
    : `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`

/** Said once files went to the browser, which does not tell whether it kept them. `all`: how many there are. */
export function handedWords(names: readonly string[], all: number): string {
  const there = names.length > 1 ? 'all of them are' : 'it is'
  const left = all - names.length
  const more = left > 0 ? ` ${counted(left, 'more file', 'more files')} to hand over.` : ''
  return `Handed to the browser as ${listed(names)}. Look among its downloads that ${there} there.${more}`
}

/** What letting go does to this one thing, and what is asked before. */
export function letGoWords(
  item: Pick<UnsentItem, 'kind' | 'code'>,
  name: string,
  files: readonly string[],
): { label: string; question: string; after: string } {
  return {
    label: files.length > 1 ? 'I have the files: let go' : 'I have the file: let go',
    question: `${files.length > 1 ? 'Are' : 'Is'} ${listed(files)} on this phone? “${name}” is then never sent.`,
    after:
      item.code === 'bytesGone'
        ? 'This phone no longer holds it, so the file does not either.'
        : item.kind === 'photoBytes'
          ? 'Let go, it is deleted here and is in the file alone.'
          : 'Let go, it is never sent. It stays on this phone only to go into each file made later.',
  }
}
