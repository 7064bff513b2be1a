// Signing out at the desk closes the field on that browser as well (docs/spec/sync.md, SO4).
import { expect, it } from 'vitest'
import { endHere } from '@/components/sign-in/end-here'
import { fail, ok } from '@/lib/model/result'

function here(works: { lock: boolean; line: boolean }) {
  const done: string[] = []
  return {
    done,
    lock() {
      done.push('lock')
      return works.lock ? Promise.resolve() : Promise.reject(new Error('the store does not answer'))
    },
    line: {
      signOut() {
        done.push('end')
        return Promise.resolve(works.line ? ok(null) : fail({ kind: 'noConnection' as const }))
      },
    },
  }
}

it.each([
  [{ lock: true, line: true }, 'out'],
  [{ lock: false, line: true }, 'fieldOpen'],
  [{ lock: true, line: false }, 'notSignedOut'],
  [{ lock: false, line: false }, 'notSignedOut'],
] as const)(
  '[SO4] with %j it is told as %s, and the field is closed first',
  async (works, ended) => {
    const at = here(works)
    expect(await endHere(at)).toBe(ended)
    expect(at.done).toEqual(['lock', 'end'])
  },
)
