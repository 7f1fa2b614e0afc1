import { nameKey } from '#shared/intake/name-key'
import type { acceptInvitationSchema, Me } from '#shared/schemas/people'
import type { ValueOf } from '#shared/schemas/parse'
import { recordAudit } from '../../audit/record-audit'
import { actingAs, withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { AppError, inputInvalid } from '../../errors/app-error'
import { useInvitation } from '../../repositories/invitation-repository'
import { findObserverByNameKey, insertObserver } from '../../repositories/observer-repository'
import { findPersonByEmail, getPerson, insertPerson, setCoordinatorOf } from '../../repositories/person-repository'
import { actorOf } from './actor-of-session'
import { meOf } from './me-of'
import { usableInvitation } from './read-invitation'
import { startSession } from './start-session'

type NewAccount = ValueOf<typeof acceptInvitationSchema>

/**
 * Makes the account that a link invites to, with its roles and its observer, and signs it in. Open to whoever has the link;
 * records person.joined and person.signed-in; throws invitation-unusable, email-taken, input-invalid for another address than was invited.
 */
export async function acceptInvitation(ctx: Context, token: string, account: NewAccount): Promise<{ me: Me, sessionId: string }> {
  await usableInvitation(ctx.reads, ctx, token) // before the costly hash; asked again in the transaction
  const passwordHash = await ctx.passwords.hash(account.password)
  const { personId, sessionId } = await withTransaction(ctx, async (tx) => {
    const personId = await join(tx, ctx, token, { ...account, passwordHash })
    return { personId, sessionId: await startSession(tx, ctx, personId) }
  })
  return { me: await meOf(actingAs(ctx, actorOf(await getPerson(ctx.reads, personId)))), sessionId }
}

async function join(tx: Tx, ctx: Context, token: string, { email, displayName, passwordHash }: NewAccount & { passwordHash: string }): Promise<string> {
  const invitation = await usableInvitation(tx, ctx, token)
  if (invitation.email !== null && invitation.email !== email) throw inputInvalid([{ path: 'email', reason: 'is not the address that was invited' }])
  if (await findPersonByEmail(tx, email)) {
    throw new AppError('email-taken', 'Somebody with this e-mail address already has an account. Sign in with it, or give another address.')
  }
  const personId = ctx.ids.newId()
  const now = ctx.clock.now()
  await insertPerson(tx, {
    id: personId,
    email,
    display_name: displayName,
    password_hash: passwordHash,
    is_observer: invitation.is_observer,
    is_administrator: invitation.is_administrator,
    created_at: now,
  })
  if (invitation.coordinator_of) await setCoordinatorOf(tx, personId, [invitation.coordinator_of], now)
  await useInvitation(tx, invitation.id, personId, now)
  await createObserver(tx, ctx, { personId, displayName })
  const recorder = actingAs(ctx, actorOf(await getPerson(tx, personId)))
  await recordAudit(tx, recorder, { event: 'person.joined', subjectKind: 'person', subjectId: personId, detail: { invitationId: invitation.id } })
  await recordAudit(tx, recorder, { event: 'person.signed-in', subjectKind: 'person', subjectId: personId, detail: {} })
  return personId
}

/** Where another observer bears the name, none is made: whose measures those are is not for a newcomer to claim. */
async function createObserver(tx: Tx, ctx: Context, { personId, displayName }: { personId: string, displayName: string }): Promise<void> {
  const key = nameKey(displayName)
  if (await findObserverByNameKey(tx, key)) return
  await insertObserver(tx, { id: ctx.ids.newId(), name: displayName, name_key: key, person_id: personId, created_at: ctx.clock.now() })
}
