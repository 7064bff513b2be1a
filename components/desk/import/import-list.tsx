import { Row } from '@/components/ui/row'
import type { ImportAnswer } from '@/lib/sync/protocol/unsent-file'
import { size } from '../../field/times'
import { whenWords } from '../../field/when-words'
import { useNow } from '../use-now'
import { listedTitle, outcomeWords } from './import-words'

/** Every record and photo of the file with what became of it. */
export function ImportList({ list, zone }: { list: ImportAnswer; zone: string }) {
  const now = useNow()
  return (
    <ol>
      {list.ops.map((op) => (
        <li key={op.opId}>
          <Row
            title={listedTitle(op)}
            second={outcomeWords(op)}
            end={whenWords(op.since, zone, now)}
            struck={op.outcome === 'refused'}
          />
        </li>
      ))}
      {list.photos.map((photo) => (
        <li key={photo.hash}>
          <Row
            title="Photo or voice note"
            second={outcomeWords(photo)}
            end={whenWords(photo.since, zone, now)}
            endSecond={size(photo.bytes)}
            struck={photo.outcome === 'refused'}
          />
        </li>
      ))}
    </ol>
  )
}
