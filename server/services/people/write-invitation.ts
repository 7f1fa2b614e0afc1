import type { InvitationView, NewInvitation } from '#shared/schemas/people'
import { isoAfter } from '../../context/clock'
import type { Context, Tx } from '../../context/context'
import { insertInvitation } from '../../repositories/invitation-repository'
import type { InvitationRow } from '../../repositories/invitation-repository'
import { secretHash } from './secret-hash'

/** An invitation can be used for this long. */
export const INVITATION_LIMIT_MS = 14 * 24 * 3600 * 1000

type Invited = Pick<InvitationView, 'email' | 'isObserver' | 'isAdministrator' | 'coordinatorOf'>

/** Writes an invitation and answers it with its link. For services that have asked permission; the caller records it. */
export async function writeInvitation(tx: Tx, ctx: Context, { email, isObserver, isAdministrator, coordinatorOf }: Invited): Promise<NewInvitation> {
  const token = ctx.ids.newToken()
  const row: InvitationRow = {
    id: ctx.ids.newId(),
    token_hash: secretHash(token),
    email,
    is_observer: isObserver ? 1 : 0,
    is_administrator: isAdministrator ? 1 : 0,
    coordinator_of: coordinatorOf,
    created_by: ctx.actor?.personId ?? null,
    created_at: ctx.clock.now(),
    expires_at: isoAfter(ctx.clock, INVITATION_LIMIT_MS),
    used_at: null,
    used_by: null,
  }
  await insertInvitation(tx, row)
  return { ...invitationView(row), url: `${ctx.baseUrl}/invitation/${token}` }
}

export function invitationView(row: InvitationRow): InvitationView {
  return {
    id: row.id,
    email: row.email,
    isObserver: row.is_observer === 1,
    isAdministrator: row.is_administrator === 1,
    coordinatorOf: row.coordinator_of,
    createdAt: row.created_at,
    expiresAt: row.expires_at,
    usedAt: row.used_at,
  }
}
