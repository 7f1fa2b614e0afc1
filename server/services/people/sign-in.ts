import type { Me, signInSchema } from '#shared/schemas/people'
import type { ValueOf } from '#shared/schemas/parse'
import { recordAudit } from '../../audit/record-audit'
import { actingAs, withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { AppError } from '../../errors/app-error'
import { findPerson, findPersonByEmail } from '../../repositories/person-repository'
import { actorOf } from './actor-of-session'
import { createAttemptLimiter } from './attempt-limiter'
import { meOf } from './me-of'
import { startSession } from './start-session'

const limiter = createAttemptLimiter()
/** Lets whole households behind one address in, but not a list of guesses over many accounts. */
const addressLimiter = createAttemptLimiter({ maxFailures: 100 })

/**
 * Starts a session for the one who knows the password. Anybody may call it, some times; records person.signed-in; throws
 * sign-in-failed, alike for an unknown address and a wrong password, or too-many-attempts.
 */
export async function signIn(ctx: Context, { email, password }: ValueOf<typeof signInSchema>, clientAddress: string): Promise<{ me: Me, sessionId: string }> {
  const key = `${clientAddress} ${email}`
  addressLimiter.begin(clientAddress, ctx.clock)
  limiter.begin(key, ctx.clock)
  const known = await findPersonByEmail(ctx.reads, email)
  const isRight = await ctx.passwords.matches(password, known?.password_hash ?? null)
  const person = isRight && known ? await findPerson(ctx.reads, known.id) : undefined
  // The hash is compared again: the password may have been changed while it was being checked.
  if (!person || person.state !== 'active' || person.password_hash !== known?.password_hash) {
    throw new AppError('sign-in-failed', 'Check both and try again. If you have no account yet, ask an administrator for an invitation.')
  }
  limiter.succeeded(key)
  addressLimiter.succeeded(clientAddress)
  const actor = actorOf(person)
  const sessionId = await withTransaction(ctx, async (tx) => {
    await recordAudit(tx, actingAs(ctx, actor), { event: 'person.signed-in', subjectKind: 'person', subjectId: person.id, detail: {} })
    return await startSession(tx, ctx, person.id)
  })
  return { me: await meOf(actingAs(ctx, actor)), sessionId }
}
