import type { Id } from '@/lib/model/id'
import type { Suspect } from './belief'

/** Natural log of the factor on the odds from which on evidence speaks clearly for a suspect (guess): 1.1 times. */
const CLEARLY = 0.1

/**
 * The entry of the check, reading or swap that spoke most strongly for a suspect: the one a part line names as
 * its reason (rule R14). Null when none spoke clearly; codes and symptoms condemn no part.
 */
export function condemnedBy(suspect: Pick<Suspect, 'why'>): Id | null {
  const seen = suspect.why.filter(
    (why) =>
      why.entryId !== null &&
      !why.saysNothing &&
      (why.about === 'check' || why.about === 'reading' || why.about === 'swap'),
  )
  const strongest = seen.sort((a, b) => b.logRatio - a.logRatio)[0]
  return strongest !== undefined && strongest.logRatio > CLEARLY ? strongest.entryId : null
}
