import type { FaultItem } from '@/lib/model/code-book'

/** A fault without its shares, which stand together in `shares.ts` so that a list can be seen to add up. */
export type FaultData = Omit<FaultItem, 'kind' | 'shares' | 'source'>
