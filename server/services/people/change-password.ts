import type { changePasswordSchema } from '#shared/schemas/people'
import type { ValueOf } from '#shared/schemas/parse'
import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { AppError, inputInvalid, signInRequired } from '../../errors/app-error'
import { getPerson, updatePerson } from '../../repositories/person-repository'
import { revokeSessionsOf } from '../../repositories/session-repository'
import { createAttemptLimiter } from './attempt-limiter'

const limiter = createAttemptLimiter()

/**
 * Gives the actor a new password and ends their other sessions. Open to whoever is signed in and knows the present one;
 * records password.changed; throws input-invalid for a wrong present password, too-many-attempts, changed-meanwhile.
 */
export async function changePassword(ctx: Context, { currentPassword, newPassword }: ValueOf<typeof changePasswordSchema>, sessionId: string): Promise<void> {
  if (!ctx.actor) throw signInRequired()
  const { personId } = ctx.actor
  limiter.begin(personId, ctx.clock)
  const { password_hash: seenHash } = await getPerson(ctx.reads, personId)
  if (!await ctx.passwords.matches(currentPassword, seenHash)) {
    throw inputInvalid([{ path: 'currentPassword', reason: 'is not your present password' }])
  }
  limiter.succeeded(personId)
  const newHash = await ctx.passwords.hash(newPassword)
  await withTransaction(ctx, async (tx) => {
    const person = await getPerson(tx, personId)
    if (person.password_hash !== seenHash) throw new AppError('changed-meanwhile', 'Your password was changed elsewhere meanwhile. Sign in with the newest one and try again.')
    await updatePerson(tx, personId, { password_hash: newHash })
    const sessionsEnded = await revokeSessionsOf(tx, personId, ctx.clock.now(), { except: sessionId })
    await recordAudit(tx, ctx, { event: 'password.changed', subjectKind: 'person', subjectId: personId, detail: { sessionsEnded } })
  })
}
