import type { FitForRuling } from '#shared/policies/ruling'
import type { Reads } from '../../context/context'
import { listFitBatches, listNewMeasureIds } from '../../repositories/fit-content-repository'
import { listCreditedPersonIds } from '../../repositories/measure-repository'
import { listCoordinators } from '../../repositories/person-repository'

/** Whose work a fit's new measures are and who could rule on it, for the policy. */
export async function fitForRuling(reads: Reads, { fitId, programmeId }: { fitId: string; programmeId: string }): Promise<FitForRuling> {
  const newMeasureIds = await listNewMeasureIds(reads, fitId)
  const owners = newMeasureIds.length === 0 ? [] : (await listFitBatches(reads, fitId)).map(batch => batch.owner_id)
  const credited = await listCreditedPersonIds(reads, newMeasureIds)
  const coordinators = await listCoordinators(reads, programmeId)
  return { programmeId, newMeasuresOf: [...new Set([...owners, ...credited])], coordinatorIds: coordinators.map(person => person.id) }
}
