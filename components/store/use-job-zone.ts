'use client'
import type { Id } from '@/lib/model/id'
import { useStore } from './store-provider'
import { useJob } from './use-rows'

/**
 * The zone in which times of a job are typed and shown: the job's own, whatever phone wrote the entry, so
 * that one log has one clock. The phone's, while the job is being opened.
 */
export function useJobZone(jobId: Id): string {
  const store = useStore()
  return useJob(jobId)?.zone ?? store.ports.zone()
}
