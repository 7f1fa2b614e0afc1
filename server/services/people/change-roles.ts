import { mayAdminister } from '#shared/policies/administering'
import type { changeRolesSchema, PersonView } from '#shared/schemas/people'
import type { ValueOf } from '#shared/schemas/parse'
import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { inputInvalid, notFound, wrongState } from '../../errors/app-error'
import { countAdministrators, getPerson, setCoordinatorOf, updatePerson } from '../../repositories/person-repository'
import { findUnknownProgrammes } from '../../repositories/programme-repository'
import { personView } from './list-people'

/**
 * Sets all roles of a person. For administrators; records roles.changed; throws not-found, input-invalid for an unknown
 * programme, wrong-state where nobody would be left to administer.
 */
export async function changeRoles(ctx: Context, personId: string, roles: ValueOf<typeof changeRolesSchema>): Promise<PersonView> {
  if (!mayAdminister(ctx.actor)) throw notFound()
  return await withTransaction(ctx, async (tx) => {
    await getPerson(tx, personId)
    const unknown = await findUnknownProgrammes(tx, roles.coordinatorOf)
    if (unknown.length > 0) throw inputInvalid([{ path: 'coordinatorOf', reason: `${unknown.length} of these are no programmes of this installation` }])
    if (!roles.isAdministrator && await countAdministrators(tx, { except: personId }) === 0) {
      throw wrongState('This is the only administrator. Make somebody else administrator first.')
    }
    await updatePerson(tx, personId, { is_observer: roles.isObserver ? 1 : 0, is_administrator: roles.isAdministrator ? 1 : 0 })
    await setCoordinatorOf(tx, personId, roles.coordinatorOf, ctx.clock.now())
    const changed = await getPerson(tx, personId)
    await recordAudit(tx, ctx, {
      event: 'roles.changed',
      subjectKind: 'person',
      subjectId: personId,
      detail: { isObserver: roles.isObserver, isAdministrator: roles.isAdministrator, coordinatorOf: changed.coordinatorOf },
    })
    return personView(changed)
  })
}
