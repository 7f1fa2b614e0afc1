import type { Actor } from '../schemas/people'

/** Being administrator gives none of the rights in this file. */
export function isCoordinatorOf(actor: Actor | null, programmeId: string): boolean {
  return actor !== null && actor.coordinatorOf.includes(programmeId)
}

export function mayCreateTarget(actor: Actor | null, { programmeId }: { programmeId: string }): boolean {
  return isCoordinatorOf(actor, programmeId)
}

/** Set aside, take back and ask for a refit; this does not make the fit one's own. */
export function mayRequestFit(actor: Actor | null, { programmeId }: { programmeId: string }): boolean {
  return isCoordinatorOf(actor, programmeId)
}

export function mayPublish(actor: Actor | null, { programmeId }: { programmeId: string }): boolean {
  return isCoordinatorOf(actor, programmeId)
}

export function mayWithdrawEdition(actor: Actor | null, { programmeId }: { programmeId: string }): boolean {
  return isCoordinatorOf(actor, programmeId)
}

/** The desk lists what waits in the programmes one coordinates. */
export function hasDesk(actor: Actor | null): boolean {
  return actor !== null && actor.coordinatorOf.length > 0
}
