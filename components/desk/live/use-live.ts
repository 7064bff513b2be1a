import { type QueryClient, useQueryClient } from '@tanstack/react-query'
import { useEffect, useState } from 'react'
import type { Actor } from '@/lib/model/person'
import { actorIn } from '../../sign-in/read-actor'
import type { DeskPorts } from '../desk-ports'
import { startLive } from './live-stream'
import type { Change, LineState } from './live-words'
import { reads, staleReads } from './stale-reads'

/** Changes that arrive together (one push carries many entries) are read once. */
const GATHER_MS = 120

/** Collects changes and makes their reads stale in one go; a gap makes all of them stale. */
function gatherer(client: QueryClient) {
  let waiting: Change[] = []
  let all = false
  let timer: ReturnType<typeof setTimeout> | undefined
  function flush() {
    const stale = all ? [reads.all] : waiting.flatMap(staleReads)
    waiting = []
    all = false
    timer = undefined
    const seen = new Set<string>()
    for (const queryKey of stale) {
      const name = JSON.stringify(queryKey)
      if (!seen.has(name)) void client.invalidateQueries({ queryKey })
      seen.add(name)
    }
  }
  const soon = () => {
    timer ??= setTimeout(flush, GATHER_MS)
  }
  return {
    change(change: Change) {
      waiting.push(change)
      soon()
    },
    gap() {
      all = true
      soon()
    },
    stop: () => clearTimeout(timer),
  }
}

/** Whenever this tab is looked at again. */
function onLook(look: () => void): () => void {
  window.addEventListener('focus', look)
  document.addEventListener('visibilitychange', look)
  return () => {
    window.removeEventListener('focus', look)
    document.removeEventListener('visibilitychange', look)
  }
}

/** True when the shop's answer to "who is this?" names this very person. */
function isPerson(answer: unknown, { shopId, personId }: Pick<Actor, 'shopId' | 'personId'>) {
  const who = actorIn(answer)
  return who?.shopId === shopId && who.personId === personId
}

/** Listens for changes of the shop for as long as the desk is open; answers how the line is. */
export function useLive(actor: Actor, ports: DeskPorts): LineState {
  const client = useQueryClient()
  const [state, setState] = useState<LineState>({ kind: 'opening' })
  const { shopId, personId } = actor
  useEffect(() => {
    const gather = gatherer(client)
    const stop = startLive({
      line: ports.line,
      tabs: ports.tabs(),
      now: ports.now,
      isMe: (answer) => isPerson(answer, { shopId, personId }),
      onLook,
      name: `farbench-desk:${shopId}:${personId}`,
      onState: setState,
      onChange: gather.change,
      onGap: gather.gap,
    })
    return () => {
      stop()
      gather.stop()
    }
  }, [client, ports, shopId, personId])
  return state
}
