'use client'
import { useEffect, useMemo, useState } from 'react'
import { useBook } from '../store/use-book'
import { engine } from './engine-client'
import type { Answer, Question } from './work'

export type EngineView = {
  answer: Answer | null
  /** What that answer was asked with; while a newer one is worked out, or failed, this is the older one. */
  question: Question | null
  /** A newer answer is being worked out; the last one stands until it is there. */
  working: boolean
  /** The newest question has no answer: the one that stands is older, and leaves the newest entry out. */
  failed: boolean
}

type Held = { name: string; key: string; question: Question; answer: Answer }

/** Last answers by name, so that a screen opened again shows the old list first and then moves. */
const last = new Map<string, Held>()
const LAST_KEPT = 40

/** The engine's answer to a question, kept under a name while the next one is worked out. */
export function useEngine(name: string, question: Question | null): EngineView {
  const { index } = useBook()
  const key = useMemo(
    () =>
      question === null || index === null
        ? null
        : `${index.version} ${index.withdrawn.join()} ${keyOf(question)}`,
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
        const next = { name, key, question, answer }
        keep(next)
        if (current) setHeld(next)
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
  return engineView(mine, key, failedKey)
}

/** What is shown of the last answer, the present question's key and the key of one that failed. */
export function engineView(
  held: Pick<Held, 'key' | 'question' | 'answer'> | null,
  key: string | null,
  failedKey: string | null,
): EngineView {
  const isOpen = key !== null && held?.key !== key
  return {
    answer: held?.answer ?? null,
    question: held?.question ?? null,
    working: isOpen && failedKey !== key,
    failed: isOpen && failedKey === key,
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
