import { Row } from '@/components/ui/row'
import type { ImportAnswer } from '@/lib/sync/protocol/unsent-file'
import { clockTime, size } from '../../field/times'
import { listedTitle, outcomeWords } from './import-words'

/** Every record and photo of the file with what became of it. */
export function ImportList({ list, zone }: { list: ImportAnswer; zone: string }) {
  return (
    <ol>
      {list.ops.map((op) => (
        <li key={op.opId}>
          <Row
            title={listedTitle(op)}
            second={outcomeWords(op)}
            end={clockTime(op.since, zone)}
            struck={op.outcome === 'refused'}
          />
        </li>
      ))}
      {list.photos.map((photo) => (
        <li key={photo.hash}>
          <Row
            title="Photo or voice note"
            second={outcomeWords(photo)}
            end={clockTime(photo.since, zone)}
            endSecond={size(photo.bytes)}
            struck={photo.outcome === 'refused'}
          />
        </li>
      ))}
    </ol>
  )
}
