import type { Context, Tx } from '../../context/context'
import { isoAfter } from '../../context/clock'
import { insertSession } from '../../repositories/session-repository'

/** A session ends after this, used or not. */
export const SESSION_LIMIT_MS = 30 * 24 * 3600 * 1000

/** Writes a session of the person and answers its id. For services that have just established who it is; the caller records it. */
export async function startSession(tx: Tx, ctx: Context, personId: string): Promise<string> {
  const id = ctx.ids.newId()
  const now = ctx.clock.now()
  await insertSession(tx, { id, person_id: personId, created_at: now, last_seen_at: now, expires_at: isoAfter(ctx.clock, SESSION_LIMIT_MS), revoked_at: null })
  return id
}
