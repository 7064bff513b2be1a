'use client'
import { useEffect, useState } from 'react'
import { DeviceDb, knownPersons } from '@/lib/sync/client/device-db'

/** True once it is known that this browser holds a store of somebody; false while nobody knows. */
export function useStoresHere(): boolean {
  const [isHeld, setHeld] = useState(false)
  useEffect(() => {
    let open = true
    const device = new DeviceDb()
    knownPersons(device)
      .then(
        (persons) => open && setHeld(persons.length > 0),
        // Nothing is claimed of a store that cannot be asked.
        () => undefined,
      )
      .finally(() => device.close())
    return () => {
      open = false
    }
  }, [])
  return isHeld
}
