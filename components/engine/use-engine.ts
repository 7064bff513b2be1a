'use client'
import { useEffect, useMemo, useState } from 'react'
import { useBook } from '../store/use-book'
import { engine } from './engine-client'
import type { Answer, Question } from './work'

export type EngineView = {
  answer: Answer | null
  /** A newer answer is being worked out; the last one stands until it is there. */
  working: boolean
  failed: boolean
}

type Held = { name: string; key: string; answer: Answer }

/** Last answers by name, so that a screen opened again shows the old list first and then moves. */
const last = new Map<string, Held>()
const LAST_KEPT = 40

/** The engine's answer to a question, kept under a name while the next one is worked out. */
export function useEngine(name: string, question: Question | null): EngineView {
  const { index } = useBook()
  const key = useMemo(
    () => (question === null || index === null ? null : `${index.version} ${keyOf(question)}`),
    [question, index],
  )
  const [held, setHeld] = useState<Held | null>(() => last.get(name) ?? null)
  const [failedKey, setFailedKey] = useState<string | null>(null)
  useEffect(() => {
    if (key === null || question === null || index === null) return
    const kept = last.get(name)
    if (kept?.key === key) {
      setHeld(kept)
      return
    }
    let current = true
    engine.ask(index, question).then(
      (answer) => {
        keep({ name, key, answer })
        if (current) setHeld({ name, key, answer })
      },
      () => {
        if (current) setFailedKey(key)
      },
    )
    return () => {
      current = false
    }
  }, [name, key, question, index])
  const mine = held?.name === name ? held : (last.get(name) ?? null)
  return {
    answer: mine?.answer ?? null,
    working: key !== null && mine?.key !== key && failedKey !== key,
    failed: failedKey !== null && failedKey === key,
  }
}

function keep(held: Held): void {
  last.delete(held.name)
  last.set(held.name, held)
  const oldest = last.keys().next().value
  if (last.size > LAST_KEPT && oldest !== undefined) last.delete(oldest)
}

/** Two questions with the same key have the same answer: entries never change, so their ids stand for them. */
export function keyOf(question: Question): string {
  const { case: input, means, outlookOf } = question
  return JSON.stringify([
    input.features,
    input.job.complaint,
    input.entries.map((entry) => entry.id),
    input.spec,
    input.meter,
    means,
    outlookOf,
  ])
}
