import { dropExpired } from '@/lib/sync/server/photo-stage'

/** dropStaged: lets go of uploads that were not whole after 30 days (PH3); the phone begins them again. */
export async function dropStaged(): Promise<void> {
  await dropExpired()
}
