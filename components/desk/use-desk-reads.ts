import { useQuery } from '@tanstack/react-query'
import {
  type DeskBoard,
  type DeskJob,
  type DeskParts,
  deskBoard,
  deskJob,
  deskParts,
} from '@/lib/model/desk'
import { useDesk } from './desk-context'
import { reads } from './live/stale-reads'
import { read } from './read-json'

/** The board: every open job, or a mechanic's own. */
export function useBoard(whose: 'all' | 'own') {
  const { ports } = useDesk()
  return useQuery<DeskBoard>({
    queryKey: [...reads.board, whose],
    queryFn: () => read(ports.line, `/api/desk/jobs?whose=${whose}`, deskBoard),
  })
}

/** One job with its log, photos and parts. */
export function useDeskJob(jobId: string | null) {
  const { ports } = useDesk()
  return useQuery<DeskJob>({
    queryKey: reads.job(jobId ?? ''),
    queryFn: () => read(ports.line, `/api/desk/jobs/${jobId}`, deskJob),
    enabled: jobId !== null,
  })
}

/** Every part line the shop has been asked for and not cancelled long ago. */
export function useDeskParts() {
  const { ports } = useDesk()
  return useQuery<DeskParts>({
    queryKey: reads.parts,
    queryFn: () => read(ports.line, '/api/desk/parts', deskParts),
  })
}
