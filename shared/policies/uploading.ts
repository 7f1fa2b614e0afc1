import type { Actor } from '../schemas/people'

export function mayUpload(actor: Actor | null): boolean {
  return actor?.isObserver === true
}

/** Mend, choose a target, send, withdraw, discard: the owner alone, while an observer. */
export function mayChangeBatch(actor: Actor | null, batch: { ownerId: string }): boolean {
  return actor !== null && actor.isObserver && actor.personId === batch.ownerId
}
