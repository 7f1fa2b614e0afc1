import type { Reads } from '../../context/context'
import { publishingCase, unmetRules } from '../../domain/publishing-rules'
import type { FitRecord } from '../../repositories/fit-repository'
import { getProgramme } from '../../repositories/programme-repository'
import { listRulings } from '../../repositories/ruling-repository'
import type { TargetRow } from '../../repositories/target-repository'
import { resultOf } from '../fits/fit-summary'

/** The rules of the programme that a fit does not meet yet, each in a sentence; empty where publishing is open. */
export async function findUnmetRules(reads: Reads, fit: FitRecord, target: TargetRow): Promise<string[]> {
  const result = resultOf(fit)
  if (result === null) return ['There is no result to publish.']
  const programme = await getProgramme(reads, target.programme_id)
  const rulings = await listRulings(reads, fit.id)
  const acceptedBy = rulings.findLast(ruling => ruling.decision === 'accept')?.person_id
  const consents = new Set(rulings.filter(ruling => ruling.decision === 'consent' && ruling.person_id !== acceptedBy).map(ruling => ruling.person_id))
  return unmetRules({
    leastMeasures: programme.least_measures,
    leastObservers: programme.least_observers,
    leastArcTurns: programme.least_arc_turns,
    needsSecondConsent: programme.needs_second_consent === 1,
  }, publishingCase(result, consents.size))
}
