import { mayAdminister } from '#shared/policies/administering'
import type { inviteSchema, NewInvitation } from '#shared/schemas/people'
import type { ValueOf } from '#shared/schemas/parse'
import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { AppError, inputInvalid, notFound } from '../../errors/app-error'
import { findPersonByEmail } from '../../repositories/person-repository'
import { findProgramme } from '../../repositories/programme-repository'
import { writeInvitation } from './write-invitation'

/**
 * Makes a link that creates one account with these roles; the link is answered this once and kept as a hash. For
 * administrators; records person.invited; throws email-taken, input-invalid for an unknown programme.
 */
export async function invitePerson(ctx: Context, invitation: ValueOf<typeof inviteSchema>): Promise<NewInvitation> {
  if (!mayAdminister(ctx.actor)) throw notFound()
  return await withTransaction(ctx, async (tx) => {
    if (invitation.email && await findPersonByEmail(tx, invitation.email)) {
      throw new AppError('email-taken', 'Somebody with this e-mail address already has an account. Change the roles of that account instead.')
    }
    const coordinatorOf = invitation.coordinatorOf ?? null
    if (coordinatorOf && !await findProgramme(tx, coordinatorOf)) {
      throw inputInvalid([{ path: 'coordinatorOf', reason: 'is not a programme of this installation' }])
    }
    const made = await writeInvitation(tx, ctx, { email: invitation.email ?? null, isObserver: invitation.isObserver, isAdministrator: invitation.isAdministrator, coordinatorOf })
    await recordAudit(tx, ctx, {
      event: 'person.invited',
      subjectKind: 'invitation',
      subjectId: made.id,
      detail: { isObserver: made.isObserver, isAdministrator: made.isAdministrator, coordinatorOf },
    })
    return made
  })
}
