import { mayAdminister } from '#shared/policies/administering'
import type { Page } from '#shared/schemas/ids'
import type { InvitationView } from '#shared/schemas/people'
import type { Context } from '../../context/context'
import { notFound } from '../../errors/app-error'
import { decodeCursor, DEFAULT_LIMIT, pageOf } from '../../repositories/cursor'
import type { PageQuery } from '../../repositories/cursor'
import { listInvitations as listInvitationRows } from '../../repositories/invitation-repository'
import { invitationView } from './write-invitation'

/** All invitations, newest first; their links cannot be read again. For administrators. */
export async function listInvitations(ctx: Context, { cursor, limit = DEFAULT_LIMIT }: PageQuery): Promise<Page<InvitationView>> {
  if (!mayAdminister(ctx.actor)) throw notFound()
  const before = cursor === undefined ? undefined : decodeCursor(cursor, ['string', 'string'])
  const rows = await listInvitationRows(ctx.reads, { before, limit: limit + 1 })
  return pageOf(rows, limit, { keyOf: row => [row.created_at, row.id], itemOf: invitationView })
}
