import type { Suspect } from '@/lib/diag/belief'
import type { Id } from '@/lib/model/id'

/** The check, reading or swap that spoke most strongly for a suspect; null when none spoke clearly. */
export function condemnedBy(suspect: Suspect): Id | null {
  const seen = suspect.why.filter(
    (why) =>
      why.entryId !== null &&
      !why.saysNothing &&
      (why.about === 'check' || why.about === 'reading' || why.about === 'swap'),
  )
  const strongest = seen.sort((a, b) => b.logRatio - a.logRatio)[0]
  return strongest !== undefined && strongest.logRatio > 0.1 ? strongest.entryId : null
}
