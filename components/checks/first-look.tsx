import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { Row } from '../ui/row'
import { RuleEdge } from '../ui/rule-edge'
import { minutesWords } from './words'

/** What is looked at, listened to and felt before anything is measured; a look once taken leaves the list. */
export function FirstLook({ jobId, looks }: { jobId: Id; looks: readonly CheckItem[] }) {
  if (looks.length === 0) return null
  return (
    <section aria-labelledby="first-look">
      <RuleEdge id="first-look" end={String(looks.length)}>
        First look
      </RuleEdge>
      <ul>
        {looks.map((look) => (
          <li key={look.id}>
            <Row
              title={look.name}
              second={minutesWords(look.minutes)}
              href={`/field/jobs/${jobId}/checks/${look.id}`}
            />
          </li>
        ))}
      </ul>
    </section>
  )
}
