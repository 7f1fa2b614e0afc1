import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { signInRequired } from '../../errors/app-error'
import { revokeSession, revokeSessionsOf } from '../../repositories/session-repository'

/** Ends one session of the actor; the very next call under it is refused. Open to whoever is signed in; records person.signed-out. */
export async function signOut(ctx: Context, sessionId: string): Promise<void> {
  const personId = signedIn(ctx)
  await withTransaction(ctx, async (tx) => {
    const sessions = await revokeSession(tx, sessionId, ctx.clock.now())
    if (sessions > 0) await recordAudit(tx, ctx, { event: 'person.signed-out', subjectKind: 'person', subjectId: personId, detail: { sessions } })
  })
}

/** Ends every session of the actor. Open to whoever is signed in; records person.signed-out. */
export async function signOutEverywhere(ctx: Context): Promise<void> {
  const personId = signedIn(ctx)
  await withTransaction(ctx, async (tx) => {
    const sessions = await revokeSessionsOf(tx, personId, ctx.clock.now())
    await recordAudit(tx, ctx, { event: 'person.signed-out', subjectKind: 'person', subjectId: personId, detail: { sessions } })
  })
}

function signedIn(ctx: Context): string {
  if (!ctx.actor) throw signInRequired()
  return ctx.actor.personId
}
