import type { BatchState } from '../../shared/schemas/batches'
import type { Decision, FitState } from '../../shared/schemas/fits'

/**
 * The life of a fit: queued → running → done | failed; done → accepted | declined | superseded; accepted → published.
 * A queued fit is done at once where the very same request was computed before. Whatever still waits (also queued, running and
 * failed) can be superseded when newer measures or a refit replace it. A failed fit has no result to decline: a ruling on it
 * settles its batches and is kept beside it, and its state stays failed.
 */
const NEXT: Readonly<Record<FitState, readonly FitState[]>> = {
  queued: ['running', 'done', 'failed', 'superseded'],
  running: ['running', 'done', 'failed', 'superseded'],
  done: ['accepted', 'declined', 'superseded'],
  failed: ['superseded'],
  accepted: ['published'],
  declined: [],
  superseded: [],
  published: [],
}

export const WAITING_FIT_STATES = ['queued', 'running', 'done', 'failed'] as const satisfies readonly FitState[]
/** States whose measures and set-asides the next fit starts from. */
export const SETTLED_FIT_STATES = ['accepted', 'published'] as const satisfies readonly FitState[]

export function canBecome(from: FitState, to: FitState): boolean {
  return NEXT[from].includes(to)
}

export function isWaiting(state: FitState): boolean {
  return (WAITING_FIT_STATES as readonly FitState[]).includes(state)
}

/** What a ruling makes of the fit; null where the state does not allow that ruling. */
export function fitStateAfter(decision: Decision, state: FitState): FitState | null {
  if (state === 'failed') return decision === 'accept' ? null : 'failed'
  const next: FitState = decision === 'accept' ? 'accepted' : 'declined'
  return canBecome(state, next) ? next : null
}

/** What a ruling makes of the parts of batches that the fit brought in. */
export function batchStateAfter(decision: Decision): Extract<BatchState, 'accepted' | 'returned' | 'declined'> {
  if (decision === 'accept') return 'accepted'
  return decision === 'return' ? 'returned' : 'declined'
}
