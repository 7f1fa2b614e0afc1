import type { Actor } from '../schemas/people'
import { isCoordinatorOf } from './coordinating'

export interface FitForRuling {
  programmeId: string
  /** People whose work the fit's newly added measures are: owners of their batches and the observers credited. */
  newMeasuresOf: readonly string[]
  /** Active coordinators of the programme. */
  coordinatorIds: readonly string[]
}

/** A fit is one's own where newly added measures are; who asked for it does not matter. */
export function isOwnWork(actor: Actor, fit: Pick<FitForRuling, 'newMeasuresOf'>): boolean {
  return fit.newMeasuresOf.includes(actor.personId)
}

/** A coordinator of the programme, but for own work while another active coordinator could rule. */
export function mayRule(actor: Actor | null, fit: FitForRuling): boolean {
  return isCoordinatorOf(actor, fit.programmeId) && !isHinderedByOwnWork(actor, fit)
}

/** Whether own work alone keeps this coordinator from ruling. */
export function isHinderedByOwnWork(actor: Actor | null, fit: FitForRuling): boolean {
  if (!actor || !isCoordinatorOf(actor, fit.programmeId)) return false
  return isOwnWork(actor, fit) && fit.coordinatorIds.some(id => id !== actor.personId)
}
