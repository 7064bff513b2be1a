'use client'

import { useSyncExternalStore } from 'react'
import { StoreProvider } from '@/components/store/store-provider'
import { useSession } from '@/components/store/use-session'
import { Screen } from '@/components/ui/screen'
import type { FieldPorts } from '@/lib/ports/field-ports'
import { routeOf } from './route'
import { FieldRouter, useRoute } from './router'
import { Screens } from './screens'
import { Shell } from './shell'

const never = () => () => undefined

/** The field app: everything under /field. The one static document holds no screen; the phone draws it. */
export function FieldApp({ ports }: { ports?: FieldPorts }) {
  const onPhone = useSyncExternalStore<boolean>(
    never,
    () => true,
    () => false,
  )
  if (!onPhone) {
    return <Opening />
  }
  return (
    <FieldRouter>
      <StoreProvider {...(ports ? { ports } : {})}>
        <Inside />
      </StoreProvider>
    </FieldRouter>
  )
}

function Inside() {
  const session = useSession()
  const { path } = useRoute()
  const route = routeOf(path)
  if (session.kind === 'opening') {
    return <Opening />
  }
  return (
    <Shell route={route}>
      <Screens
        route={route}
        signedOut={
          session.kind === 'signedOut' && route.name !== 'about'
            ? { emptied: session.emptied === true }
            : null
        }
      />
    </Shell>
  )
}

function Opening() {
  return (
    <main className="flex min-h-dvh flex-col">
      <Screen title="Farbench">
        <p className="text-ink2">Opening what this phone holds.</p>
      </Screen>
    </main>
  )
}
