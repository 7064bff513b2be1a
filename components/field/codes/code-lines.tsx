'use client'

import { codeMeans, contextWords } from '@/components/log/code-sentences'
import { useBook } from '@/components/store/use-book'
import { LogIcon } from '@/components/ui/log-icon'
import { Row } from '@/components/ui/row'
import { codeAsShown, explainCode } from '@/lib/diag/code-words'
import type { Features } from '@/lib/model/features'
import type { LogEntry } from '@/lib/model/log-entry'

type Props = { entries: readonly LogEntry[]; features: Features; empty: string }

/** Every code taken down, in the order of the screen they came from, with its circuit and failure in words. */
export function CodeLines({ entries, features, empty }: Props) {
  const { index } = useBook()
  const codes = entries.flatMap((e) => (e.body.kind === 'code' ? [{ id: e.id, body: e.body }] : []))
  if (codes.length === 0) {
    return <p className="text-ink2">{empty}</p>
  }
  return (
    <ul>
      {codes.map(({ id, body }) => {
        const words = index === null ? null : explainCode(index, body.seen, features)
        return (
          <li key={id}>
            <Row
              icon={<LogIcon shape="diamond" />}
              title={codeAsShown(body.seen)}
              second={
                words === null
                  ? contextWords(body.context)
                  : `${codeMeans(words)} ${contextWords(body.context)}`
              }
            />
          </li>
        )
      })}
    </ul>
  )
}
