'use client'

import type { ReactNode } from 'react'
import type { DeskJob } from '@/lib/model/desk'
import type { Job } from '@/lib/model/job'
import type { Place } from '@/lib/model/place'
import { whenWords } from '../../field/when-words'
import { askedWords, counted, MACHINE_WORDS, PEOPLE_WORDS, WAY_OUT_WORDS } from '../../field/words'
import { useDesk } from '../desk-context'
import { useNow } from '../use-now'

/** Number, machine, last entry; people and machine beside each other (rule R2); the position. */
export function JobFacts({ found }: { found: DeskJob }) {
  const { job } = found
  return (
    <>
      <p className="mt-1 text-body text-ink2">
        <span className="figures mr-2 text-ink">{job.number}</span>
        {found.machineWords}. <Heard found={found} />
      </p>
      <dl className="desk-states">
        <State name="People" word={PEOPLE_WORDS[job.peopleState]}>
          <PeopleWords people={job.people} />
        </State>
        <State name="Machine" word={MACHINE_WORDS[job.machineState]}>
          {job.wayOut
            ? `Way out: ${WAY_OUT_WORDS[job.wayOut].toLowerCase()}.`
            : 'No way out chosen yet.'}
        </State>
      </dl>
      <Position place={job.place} />
      <p className="text-second text-ink2">{conditions(job)}</p>
    </>
  )
}

function Heard({ found }: { found: DeskJob }) {
  const { shop } = useDesk()
  const now = useNow()
  const last = found.entries
    .map(({ receivedAt }) => receivedAt)
    .sort()
    .at(-1)
  return (
    <>
      {last ? `Last entry in at ${whenWords(last, shop.zone, now)}` : 'Nothing written yet'}
      {found.reachedAt ? `, phone reached us ${whenWords(found.reachedAt, shop.zone, now)}.` : '.'}
    </>
  )
}

function State({ name, word, children }: { name: string; word: string; children: ReactNode }) {
  return (
    <div>
      <dt className="text-second font-bold">{name}</dt>
      <dd>
        <span className="caps block text-screen">{word}</span>
        <span className="block text-second text-ink2">{children}</span>
      </dd>
    </div>
  )
}

function PeopleWords({ people }: { people: Job['people'] }) {
  const grave = [people.hurt && 'somebody hurt', people.missing && 'somebody missing'].filter(
    Boolean,
  )
  return (
    <>
      {counted(people.count, 'person', 'people')}
      {grave.length > 0 ? (
        <strong className="text-nogo">, {grave.join(', ')}</strong>
      ) : (
        ', nobody hurt or missing'
      )}
      {people.exposed ? ', exposed' : ''}.
    </>
  )
}

const degrees = (value: number) => value.toFixed(5).replace('-', '−')

function Position({ place }: { place: Place | null }) {
  const { shop } = useDesk()
  const now = useNow()
  if (!place) return <p className="mt-3 text-body">No position yet.</p>
  const { latitude, longitude, accuracyMetres, source } = place
  return (
    <p className="mt-3 text-body">
      <span className="figures whitespace-nowrap">
        {degrees(latitude)} {degrees(longitude)}
      </span>{' '}
      {accuracyMetres === null ? null : (
        <span className="figures ml-2 whitespace-nowrap text-ink2">
          ±{Math.round(accuracyMetres)} m
        </span>
      )}
      <span className="block text-second text-ink2">
        {source === 'fix' ? 'Position fix' : `Typed${place.asTyped ? ` as ${place.asTyped}` : ''}`}{' '}
        at {whenWords(place.at, shop.zone, now)}
        {accuracyMetres === null && source === 'fix' ? ', accuracy not told' : ''}, WGS 84 degrees.
        {place.words ? ` ${place.words}` : ''}
      </span>
    </p>
  )
}

/** What happened before, weather and air temperature in one sentence each, as far as taken down. */
function conditions(job: Job): string {
  const air = job.airTempC === null ? '' : `${String(job.airTempC).replace('-', '−')} °C`
  const weather = [job.weather, air].filter(Boolean).join(', ')
  return `${askedWords(job)}${weather && ` Weather: ${weather}.`}`
}
