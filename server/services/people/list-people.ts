import { mayAdminister } from '#shared/policies/administering'
import type { Page } from '#shared/schemas/ids'
import type { PersonView } from '#shared/schemas/people'
import type { Context } from '../../context/context'
import { notFound } from '../../errors/app-error'
import { decodeCursor, DEFAULT_LIMIT, pageOf } from '../../repositories/cursor'
import type { PageQuery } from '../../repositories/cursor'
import { listPeople as listPeopleRows } from '../../repositories/person-repository'
import type { PersonWithRoles } from '../../repositories/person-repository'

/** All people by name, with their addresses and roles. For administrators. */
export async function listPeople(ctx: Context, { cursor, limit = DEFAULT_LIMIT }: PageQuery): Promise<Page<PersonView>> {
  if (!mayAdminister(ctx.actor)) throw notFound()
  const after = cursor === undefined ? undefined : decodeCursor(cursor, ['string', 'string'])
  const rows = await listPeopleRows(ctx.reads, { after, limit: limit + 1 })
  return pageOf(rows, limit, { keyOf: row => [row.display_name, row.id], itemOf: personView })
}

export function personView(row: PersonWithRoles): PersonView {
  return {
    id: row.id,
    displayName: row.display_name,
    email: row.email ?? '',
    isObserver: row.is_observer === 1,
    isAdministrator: row.is_administrator === 1,
    coordinatorOf: row.coordinatorOf,
    state: row.state,
    createdAt: row.created_at,
  }
}
