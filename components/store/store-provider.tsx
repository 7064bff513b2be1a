'use client'
import { createContext, type ReactNode, use, useEffect, useState } from 'react'
import { AppError } from '@/lib/model/result'
import { browserPorts, type FieldPorts } from '@/lib/ports/field-ports'
import { FieldStore } from '@/lib/sync/client/field-store'
import type { Phone } from '@/lib/sync/client/phone'
import { useWatch } from './use-watch'

const StoreContext = createContext<{ store: FieldStore; ports: FieldPorts } | null>(null)

/** Opens what this phone holds and keeps it open for everything inside. Tests give their own ports. */
export function StoreProvider(props: { ports?: FieldPorts; children: ReactNode }) {
  const [value] = useState(() => {
    const ports = props.ports ?? browserPorts
    return { store: new FieldStore(ports), ports }
  })
  useEffect(() => value.store.start(), [value])
  return <StoreContext value={value}>{props.children}</StoreContext>
}

function useContextValue() {
  const value = use(StoreContext)
  if (value === null) throw new AppError('noStoreProvider')
  return value
}

/** The store of the field app. */
export const useStore = (): FieldStore => useContextValue().store

/** The outside things the screens use: position, camera, clock. */
export const usePorts = (): FieldPorts => useContextValue().ports

/** The open store of the person at work; null while opening and when nobody is. */
export const usePhone = (): Phone | null => useWatch(useStore().phone)
