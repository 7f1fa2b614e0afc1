import type { BatchState } from '../../shared/schemas/batches'

/**
 * The life of a batch's part, the rows of one batch that belong to one target:
 * draft → sent → accepted | returned | declined | withdrawn, and returned → draft.
 *
 * Beyond that line one step exists, accepted → sent: rows that were kept as a draft and mended after the rest was accepted
 * are sent later. It cannot undo the acceptance, since a measure stands by itself (it stands until it is superseded), and a
 * ruling takes away only the measures that are new in the fit ruled upon.
 */
const NEXT: Readonly<Record<BatchState, readonly BatchState[]>> = {
  draft: ['sent'],
  sent: ['sent', 'accepted', 'returned', 'declined', 'withdrawn'],
  accepted: ['sent'],
  returned: ['draft'],
  declined: [],
  withdrawn: [],
}

export function canBecome(from: BatchState, to: BatchState): boolean {
  return NEXT[from].includes(to)
}

/** A returned part is opened again by sending it, so it may be sent as a draft may. */
export function maySend(state: BatchState): boolean {
  return canBecome(state, 'sent') || canBecome(state, 'draft')
}

/** Only what nobody has ruled on can be taken back by its owner. */
export function mayWithdraw(state: BatchState): boolean {
  return canBecome(state, 'withdrawn')
}

/** A batch can be thrown away while none of its parts was ever sent. */
export function mayDiscard(states: readonly BatchState[]): boolean {
  return states.every(state => state === 'draft')
}

/** Whether others than the owner may look into a batch: from the first sending on. */
export function isOpenToOthers(parts: readonly { sentAt: string | null }[]): boolean {
  return parts.some(part => part.sentAt !== null)
}
