import type { Actor } from '#shared/schemas/people'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { findPerson } from '../../repositories/person-repository'
import type { PersonWithRoles } from '../../repositories/person-repository'
import { findSession, touchSession } from '../../repositories/session-repository'

/** A session that is not used for this long has ended. */
export const IDLE_LIMIT_MS = 14 * 24 * 3600 * 1000
/** How stale `last_seen_at` may grow before it is written again. */
const TOUCH_AFTER_MS = 10 * 60 * 1000

/** The person behind a session that is in force, read anew on every call; null for one that is unknown, revoked or over. Open to all. */
export async function actorOfSession(ctx: Context, sessionId: string): Promise<Actor | null> {
  const session = await findSession(ctx.reads, sessionId)
  const nowMs = ctx.clock.nowMs()
  if (!session || session.revoked_at !== null || Date.parse(session.expires_at) <= nowMs) return null
  const idleMs = nowMs - Date.parse(session.last_seen_at)
  if (idleMs > IDLE_LIMIT_MS) return null
  const person = await findPerson(ctx.reads, session.person_id)
  if (!person || person.state !== 'active') return null
  if (idleMs > TOUCH_AFTER_MS) await withTransaction(ctx, tx => touchSession(tx, session.id, ctx.clock.now()))
  return actorOf(person)
}

export function actorOf(person: PersonWithRoles): Actor {
  return {
    personId: person.id,
    isObserver: person.is_observer === 1,
    isAdministrator: person.is_administrator === 1,
    coordinatorOf: person.coordinatorOf,
  }
}
