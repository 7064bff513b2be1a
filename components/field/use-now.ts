'use client'

import { useEffect, useState } from 'react'
import { usePorts } from '@/components/store/store-provider'

/** The time now in milliseconds, looked at again every half minute. */
export function useNow(): number {
  const { clock } = usePorts()
  const [now, setNow] = useState(() => clock.now())
  useEffect(() => {
    const timer = setInterval(() => setNow(clock.now()), 30_000)
    return () => clearInterval(timer)
  }, [clock])
  return now
}
