'use client'

import { useState } from 'react'
import { usePorts } from '@/components/store/store-provider'
import { useJobs } from '@/components/store/use-rows'
import { useStamp } from '@/components/store/use-stamp'
import { Caution } from '@/components/ui/caution'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { Point } from '@/lib/diag/distance'
import { doubtsOf, type PlaceDoubt } from '@/lib/diag/place-doubt'
import { type PlaceProblem, parsePlace, printDegrees } from '@/lib/diag/place-text'
import type { Place } from '@/lib/model/place'
import type { PositionProblem } from '@/lib/ports/position'
import { PlaceShown } from '../place-shown'
import type { StepProps } from './intake-draft'
import { afterFix, afterTyping, NO_PLACE } from './place-draft'

const FIX_WORDS: Record<PositionProblem['kind'], string> = {
  refused:
    'This phone does not let the app use its position. Allow it in the phone’s settings, or type it.',
  notHeard: 'No satellite heard. Go where the sky is open, or type the position.',
  tooSlow: 'No position within 25 seconds. Try again under open sky, or type it.',
  noReceiver: 'This device has no position receiver. Type the position.',
}

const TYPED_WORDS: Record<PlaceProblem['kind'], string> = {
  empty: '',
  notTwo: 'Two numbers are needed, each with N or S and E or W: 47.1 N 93.2 W.',
  twoOfOneKind: 'One must be N or S, the other E or W.',
  latitudeRange: 'North and south end at 90 degrees.',
  longitudeRange: 'East and west end at 180 degrees.',
  minutesRange: 'Minutes and seconds go up to 59, and only the last number may have decimals.',
}

/** Where it stands: a fix with accuracy and age, or typed; and the air. */
export function PlaceStep({ draft, change }: StepProps) {
  const near = useLastPoint()
  const stamp = useStamp()
  return (
    <>
      <FixPart place={draft.place} onPlace={(place) => change(afterFix(place))} />
      <TypedPart
        text={draft.placeText}
        near={near}
        onText={(text) => change(afterTyping(draft, text, stamp.now()))}
      />
      {draft.place === null ? null : (
        <>
          <PlaceShown place={draft.place} />
          <Key small quiet onClick={() => change(NO_PLACE)}>
            Remove this position
          </Key>
        </>
      )}
      <Field
        label="The place in words"
        hint="Trail, marker, what stands there."
        value={draft.placeWords}
        onChange={(placeWords) => change({ placeWords })}
        maxLength={200}
        autoCapitalize="sentences"
      />
      <RuleEdge>Air</RuleEdge>
      <Field
        label="Air temperature, °C"
        hint="If you know it. A meter and a coil read differently in the cold."
        value={draft.air}
        onChange={(air) => change({ air: air.slice(0, 6) })}
        inputMode="text"
        figures
      />
      <Field
        label="Weather"
        value={draft.weather}
        onChange={(weather) => change({ weather })}
        maxLength={120}
        autoCapitalize="sentences"
      />
    </>
  )
}

function useLastPoint(): Point | null {
  return useJobs()?.find((job) => job.place !== null)?.place ?? null
}

/** Takes the position of the phone, or says why it cannot. */
export function FixPart({
  place,
  onPlace,
}: {
  place: Place | null
  onPlace: (place: Place) => void
}) {
  const { position } = usePorts()
  const [looking, setLooking] = useState<boolean>(false)
  const [problem, setProblem] = useState<string | null>(null)
  const look = async () => {
    setLooking(true)
    setProblem(null)
    const answer = await position.fix()
    setLooking(false)
    if (!answer.ok) {
      setProblem(FIX_WORDS[answer.problem.kind])
      return
    }
    onPlace({ ...answer.value, source: 'fix', asTyped: null, words: null })
  }
  return (
    <div className="grid gap-2">
      <Key
        kind="plate"
        disabled={looking}
        onClick={() => {
          look().catch(() => setLooking(false))
        }}
      >
        {looking
          ? 'Listening for satellites'
          : place?.source === 'fix'
            ? 'Take it again'
            : 'Take my position'}
      </Key>
      <p role="status" className="text-second font-bold text-nogo empty:hidden">
        {problem}
      </p>
    </div>
  )
}

/** A position as typed, with what looks odd about it. */
export function TypedPart(props: {
  text: string
  near: Point | null
  onText: (text: string) => void
}) {
  const read = parsePlace(props.text)
  const doubts = read.ok ? doubtsOf(read.value, props.near) : []
  return (
    <>
      <Field
        label="Or type it"
        hint="47.1 N 93.2 W, or 47 06.0 N 93 12.0 W, or 47 06 00 N 93 12 00 W."
        value={props.text}
        onChange={props.onText}
        maxLength={120}
        autoCapitalize="characters"
        figures
        error={read.ok ? null : TYPED_WORDS[read.problem.kind] || null}
      />
      {doubts.map((doubt) => (
        <DoubtShown
          key={doubt.kind}
          doubt={doubt}
          onTake={(point) => props.onText(printDegrees(point))}
        />
      ))}
    </>
  )
}

const DOUBT_WORDS: Record<PlaceDoubt['kind'], string> = {
  otherHalf: 'With the other N/S or E/W it lies by the last job.',
  swapped: 'With the two numbers swapped it lies by the last job.',
  readAsMinutes: 'Read as degrees and minutes it lies by the last job.',
  far: 'That is far from the last job. Read the digits back one by one.',
  noLetters: 'No N, S, E or W: read as north and east.',
}

function DoubtShown({ doubt, onTake }: { doubt: PlaceDoubt; onTake: (point: Point) => void }) {
  const { meant, distanceMetres } = doubt
  return (
    <div className="grid gap-2">
      <Caution signal="NOTICE">
        {DOUBT_WORDS[doubt.kind]}
        {distanceMetres !== null && meant === null
          ? ` ${Math.round(distanceMetres / 1000)} km.`
          : ''}
      </Caution>
      {meant === null ? null : (
        <Key small quiet onClick={() => onTake(meant)}>
          Take {printDegrees(meant)}
        </Key>
      )}
    </div>
  )
}
