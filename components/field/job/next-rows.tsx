import { BookOpen, ListChecks, Route, Timer, Wrench } from 'lucide-react'
import type { ReactNode } from 'react'
import { Row } from '@/components/ui/row'
import { decidedWayOut } from '@/lib/diag/way-out'
import type { LogEntry, LogKind } from '@/lib/model/log-entry'
import type { Role } from '@/lib/model/role'
import { mayLogInField } from '@/lib/shop/may-record'
import { jobHref } from '../route'
import { counted, sentence, WAY_OUT_WORDS } from '../words'

type Props = {
  jobId: string
  entries: readonly LogEntry[]
  roles: readonly Role[]
}

type NextRow = { name: string; screen: string; icon: ReactNode; done: string; kind?: LogKind }

/** The things to do on a job, each with what is recorded of it; only what the person may record. */
export function NextRows({ jobId, entries, roles }: Props) {
  const wayOut = decidedWayOut(entries)?.body.wayOut ?? null
  const count = (...kinds: LogKind[]) => entries.filter((e) => kinds.includes(e.body.kind)).length
  const rows: NextRow[] = [
    {
      name: 'Codes',
      screen: 'codes',
      icon: <BookOpen aria-hidden="true" strokeWidth={2.5} />,
      done: codesDone(entries),
    },
    {
      name: 'Checks',
      screen: 'checks',
      icon: <ListChecks aria-hidden="true" strokeWidth={2.5} />,
      done:
        [
          some(count('check', 'couldNot'), 'check'),
          some(count('reading'), 'reading'),
          some(count('swap'), 'swap step'),
        ]
          .filter(Boolean)
          .join(', ') || 'None yet',
    },
    {
      name: 'Fix',
      screen: 'fix',
      kind: 'fix',
      icon: <Wrench aria-hidden="true" strokeWidth={2.5} />,
      done: some(count('fix'), 'fix', 'fixes') || 'None yet',
    },
    {
      name: 'Proof run',
      screen: 'proof',
      kind: 'proofRun',
      icon: <Timer aria-hidden="true" strokeWidth={2.5} />,
      done: proofDone(entries),
    },
    {
      name: 'Way out',
      screen: 'wayout',
      icon: <Route aria-hidden="true" strokeWidth={2.5} />,
      done: wayOut === null ? 'Not decided' : WAY_OUT_WORDS[wayOut],
    },
  ]
  return (
    <ul>
      {rows
        .filter((row) => row.kind === undefined || mayLogInField(roles, row.kind))
        .map((row) => (
          <li key={row.screen}>
            <Row
              title={row.name}
              second={row.done}
              icon={row.icon}
              href={jobHref(jobId, row.screen)}
            />
          </li>
        ))}
    </ul>
  )
}

const some = (n: number, one: string, many?: string): string =>
  n === 0 ? '' : counted(n, one, many)

function codesDone(entries: readonly LogEntry[]): string {
  const codes = entries.filter((e) => e.body.kind === 'code').length
  const cleared = entries.findLast((e) => e.body.kind === 'codesCleared')?.body
  const words = [
    codes > 0 ? `${counted(codes, 'code')} taken down` : '',
    entries.some((e) => e.body.kind === 'codesUnreadable') ? 'could not be read' : '',
    cleared?.kind === 'codesCleared'
      ? {
          noneBack: 'cleared, none back',
          back: 'cleared, back again',
          notYet: 'cleared, to be read again',
        }[cleared.readAgain]
      : '',
  ].filter(Boolean)
  return words.length === 0 ? 'Not read yet' : sentence(words.join(', '))
}

function proofDone(entries: readonly LogEntry[]): string {
  const last = entries.findLast((e) => e.body.kind === 'proofRun')?.body
  return last?.kind === 'proofRun'
    ? `${counted(last.starts, 'start')}, ${last.minutes} min, ${counted(last.faults, 'time', 'times')} the fault`
    : 'None yet'
}
