'use client'

import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { createContext, type ReactNode, useContext, useState } from 'react'
import type { Actor } from '@/lib/model/person'
import type { Shop } from '@/lib/model/shop'
import { useThemeAt } from '../field/theme-choice'
import { browserDeskPorts, type DeskPorts } from './desk-ports'
import type { LineState } from './live/live-words'
import { useLive } from './live/use-live'
import { retryRead } from './read-json'

export type DeskShop = Pick<Shop, 'name' | 'zone' | 'currency'>
type Desk = { actor: Actor; shop: DeskShop; ports: DeskPorts; lineState: LineState }

const DeskContext = createContext<Desk | null>(null)

/** Who sits at the desk, of which shop, and how the line is. Throws outside the desk. */
export function useDesk(): Desk {
  const desk = useContext(DeskContext)
  if (!desk) throw new Error('useDesk outside DeskProvider')
  return desk
}

type Props = { actor: Actor; shop: DeskShop; ports?: DeskPorts; children: ReactNode }

function Live({ actor, shop, ports = browserDeskPorts, children }: Props) {
  const lineState = useLive(actor, ports)
  // On pages without jobs by the nights that the board kept.
  useThemeAt(null, ports.now)
  return (
    <DeskContext.Provider value={{ actor, shop, ports, lineState }}>
      {children}
    </DeskContext.Provider>
  )
}

/** Gives the desk its reads and its live line. Reads go stale by events, not by time or focus. */
export function DeskProvider(props: Props) {
  const [client] = useState(
    () =>
      new QueryClient({
        defaultOptions: {
          queries: {
            staleTime: Number.POSITIVE_INFINITY,
            retry: retryRead,
            refetchOnWindowFocus: false,
            networkMode: 'always',
          },
        },
      }),
  )
  return (
    <QueryClientProvider client={client}>
      <Live {...props} />
    </QueryClientProvider>
  )
}
