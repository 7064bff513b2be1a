'use client'

import { settingName, settingWords } from '@/components/field/settings/setting-words'
import { Key } from '@/components/ui/key'
import type { DeskJob } from '@/lib/model/desk'
import { jobSetting } from '@/lib/model/setting'
import { may } from '@/lib/shop/permissions'
import { whenWords } from '../../field/when-words'
import type { SettleAction } from '../desk-actions'
import { useDesk } from '../desk-context'
import { useActing } from '../use-acting'
import { useNow } from '../use-now'

type Props = { found: DeskJob; settle: SettleAction }

/** Values that somebody entered without knowing of those that stand, until one looks at them (M4). */
export function AlsoEntered({ found, settle }: Props) {
  const { actor, shop } = useDesk()
  const now = useNow()
  const { busy, refusal, act } = useActing()
  const { job, people } = found
  const waiting = (job.alsoEntered ?? []).flatMap((one) => {
    const read = jobSetting.safeParse({ field: one.field, value: one.value })
    return read.success ? [{ ...one, setting: read.data }] : []
  })
  if (waiting.length === 0) return null
  const mayUse = may(actor.roles, 'job.work')
  const press = (historyId: string, use: boolean, done: string) =>
    void act(() => settle({ jobId: job.id, historyId, use }), done)
  return (
    <ul className="mt-3 grid gap-3" aria-label="Also entered">
      {waiting.map(({ id, setting, by, at, clockOdd }) => {
        const name = settingName(setting)
        const words = settingWords(setting)
        const who = people.find((person) => person.id === by)?.name ?? 'somebody else'
        return (
          <li key={id} className="border-l-4 border-ink pl-3">
            <p className="text-body">
              <b>
                {name}, also entered: {words}
              </b>{' '}
              <span className="text-second text-ink2">
                by {who}, {whenWords(at, shop.zone, now)}.
                {clockOdd ? ' The clock of that phone was wrong.' : ''}
              </span>
            </p>
            {mayUse ? (
              <p className="mt-1 flex flex-wrap gap-2">
                <Key
                  small={true}
                  className="desk-key"
                  disabled={busy}
                  aria-label={`Use it: ${name} ${words}`}
                  onClick={() => press(id, true, `${name}: ${words}.`)}
                >
                  Use it
                </Key>
                <Key
                  small={true}
                  quiet={true}
                  className="desk-key"
                  disabled={busy}
                  aria-label={`Leave it: ${name} ${words}`}
                  onClick={() => press(id, false, 'Left as it stands.')}
                >
                  Leave it
                </Key>
              </p>
            ) : null}
          </li>
        )
      })}
      {refusal ? <li className="font-bold text-nogo">{refusal}</li> : null}
    </ul>
  )
}
