'use client'

import { lazy } from 'react'
import { useUnheard } from '@/components/store/use-withdrawals'

const WithdrawalNotice = lazy(() =>
  import('./withdrawal-notice').then((file) => ({ default: file.WithdrawalNotice })),
)

/** Looks for withdrawals that are not acknowledged; the notice, with its arithmetic, is fetched when there is one. */
export function Withdrawals() {
  return useUnheard().length === 0 ? null : <WithdrawalNotice />
}
