'use client'

import { useBook } from '@/components/store/use-book'
import { useJobs, useMachines, useModels, useShop } from '@/components/store/use-rows'
import { useSession } from '@/components/store/use-session'
import { type UnsentView, useUnsent } from '@/components/store/use-unsent'
import { Caution } from '@/components/ui/caution'
import { KeyLink } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Screen } from '@/components/ui/screen'
import { ENGINE_VERSION } from '@/lib/diag/version'
import { rolesInWords } from '@/lib/shop/role-words'
import { Ticked, useReadiness } from '../first-open'
import { ThemeMenu } from '../theme-menu'
import { span } from '../times'
import { useNow } from '../use-now'
import { counted } from '../words'
import { SignOutPart } from './sign-out-part'

/** What this phone holds, which versions, the light, the cautions, and signing out. */
export function AboutScreen() {
  const { parts, ready } = useReadiness()
  return (
    <Screen title="This phone">
      <section className="grid gap-2">
        <RuleEdge>{ready ? 'Ready for no signal' : 'Not ready for no signal'}</RuleEdge>
        <ul className="grid gap-1">
          {parts.map((part) => (
            <li key={part.name} className="flex flex-wrap items-center gap-x-3">
              <Ticked on={part.there} />
              <span className="min-w-40 flex-1">{part.name}</span>
              <span className="caps text-section">{part.there ? 'here' : 'missing'}</span>
            </li>
          ))}
        </ul>
      </section>
      <Holds />
      <section className="grid gap-2">
        <RuleEdge>Light</RuleEdge>
        <ThemeMenu />
      </section>
      <section className="grid gap-3">
        <RuleEdge>What it is not</RuleEdge>
        <Caution signal="WARNING">
          Not an emergency service, and nobody watches it. If somebody is hurt or missing, call the
          emergency services first.
        </Caution>
        <Caution signal="NOTICE">
          The maker’s manual, local rules and licensed practice come first. Every figure says where
          it comes from; chances are the model’s own and can be wrong.
        </Caution>
      </section>
      <Person />
    </Screen>
  )
}

function Holds() {
  const book = useBook()
  const unsent = useUnsent()
  const shop = useShop()
  const jobs = useJobs()
  const machines = useMachines()
  const models = useModels()
  const now = useNow()
  const older = book.versions.filter((version) => version !== book.version)
  const held: [string, string][] =
    older.length === 0 ? [] : [['Held for open jobs', `Version ${older.join(', ')}`]]
  const lines: [string, string][] = [
    ['Shop', shop?.name ?? 'Not fetched yet'],
    ['Jobs', String(jobs?.length ?? 0)],
    ['Machines', String(machines?.length ?? 0)],
    ['Spec sheets', String(models?.filter((m) => m.specSheet !== null).length ?? 0)],
    [
      'Last fetched whole',
      unsent.fetchedAt === null ? 'Never' : `${span(now - Date.parse(unsent.fetchedAt))} ago`,
    ],
    ['Code book', book.version === null ? 'None' : `Version ${book.version}`],
    ...held,
    ['Checks in it', String(book.index?.checks.size ?? 0)],
    ['Engine', `Version ${ENGINE_VERSION}`],
    ['Unsent', unsentWords(unsent)],
  ]
  return (
    <section className="grid gap-2">
      <RuleEdge>It holds</RuleEdge>
      <dl className="grid gap-1.5">
        {lines.map(([name, value]) => (
          <div key={name} className="grid gap-x-3 slim:grid-cols-2">
            <dt className="text-ink2">{name}</dt>
            <dd className="font-bold">{value}</dd>
          </div>
        ))}
      </dl>
      <KeyLink small quiet href="/field/unsent">
        Unsent work
      </KeyLink>
    </section>
  )
}

/** Nothing is said of what is sent before it is counted. */
export const unsentWords = ({ counted: known, count }: Pick<UnsentView, 'counted' | 'count'>) =>
  known ? (count === 0 ? 'Nothing' : counted(count, 'thing')) : 'Counting'

function Person() {
  const session = useSession()
  if (session.kind !== 'ready') {
    return (
      <KeyLink kind="main" href="/login">
        Sign in
      </KeyLink>
    )
  }
  const { actor } = session
  return (
    <section className="grid gap-3">
      <RuleEdge>At work</RuleEdge>
      <p>
        <b>{actor.name ?? 'Name not on this phone'}</b>, {rolesInWords(actor.roles)}.
      </p>
      <SignOutPart />
    </section>
  )
}
