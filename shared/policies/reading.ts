import type { Actor } from '../schemas/people'

export interface BatchForReading {
  ownerId: string
  /** From the first sending on. */
  isOpenToOthers: boolean
  /** Programmes of the targets that it was sent to. */
  programmeIds: readonly string[]
}

/** What is published is open to everybody; here for the table's sake, so that every right has its function. */
export function mayReadPublished(_actor: Actor | null): boolean {
  return true
}

/** Targets, sent batches, fits, residuals and rulings: every signed-in person. */
export function mayReadSentWork(actor: Actor | null): boolean {
  return actor !== null
}

/** The sent part of a batch. */
export function mayReadBatch(actor: Actor | null, batch: BatchForReading): boolean {
  if (!actor) return false
  return batch.isOpenToOthers || actor.personId === batch.ownerId
}

/** Rows that are still a draft, and the raw file: the owner, and once sent the programme's coordinators. */
export function mayReadDraftsAndRawFile(actor: Actor | null, batch: BatchForReading): boolean {
  if (!actor) return false
  if (actor.personId === batch.ownerId) return true
  return batch.isOpenToOthers && batch.programmeIds.some(id => actor.coordinatorOf.includes(id))
}
