import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { deleteUnusedSystemInvitations } from '../../repositories/invitation-repository'
import { recordAudit } from '../../audit/record-audit'
import { hasAnyPerson } from '../../repositories/person-repository'
import { writeInvitation } from './write-invitation'

/**
 * A link that makes the first administrator, while nobody has an account; null once somebody has. Called at the server's
 * start only; a new link takes the place of the last one. Records person.invited.
 */
export async function makeFirstAdministratorLink(ctx: Context): Promise<string | null> {
  return await withTransaction(ctx, async (tx) => {
    if (await hasAnyPerson(tx)) return null
    await deleteUnusedSystemInvitations(tx)
    const roles = { isObserver: true, isAdministrator: true, coordinatorOf: null }
    const invitation = await writeInvitation(tx, ctx, { email: null, ...roles })
    await recordAudit(tx, ctx, { event: 'person.invited', subjectKind: 'invitation', subjectId: invitation.id, detail: roles })
    return invitation.url
  })
}
