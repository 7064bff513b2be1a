// The database and the file store that many runs share, one after the other.
import { switchDatabase } from '@/db/client'
import { openSyncWorld, type SyncWorld } from '../../support/sync-world'

/**
 * Limits of the sessions of a run. An actor of a race may stand at a gate for long while it holds a lock:
 * real time must not end its wait, or a slow machine would make another history. Nothing here survives the
 * run, so commits need not wait for the disk.
 */
const SESSION = [
  '-c timezone=UTC',
  '-c lock_timeout=120000',
  '-c idle_in_transaction_session_timeout=120000',
  '-c synchronous_commit=off',
].join(' ')

export async function openSimBase(): Promise<SyncWorld> {
  const base = await openSyncWorld()
  const url = new URL(base.db.appUrl)
  url.searchParams.set('options', SESSION)
  await switchDatabase(url.href)
  return base
}
