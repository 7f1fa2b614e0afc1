import type { InvitationView } from '#shared/schemas/people'
import type { Context, Reads } from '../../context/context'
import { AppError } from '../../errors/app-error'
import { findInvitationByTokenHash } from '../../repositories/invitation-repository'
import type { InvitationRow } from '../../repositories/invitation-repository'
import { secretHash } from './secret-hash'
import { invitationView } from './write-invitation'

/** What the holder of a link is invited to. Open to whoever has the link; throws invitation-unusable. */
export async function readInvitation(ctx: Context, token: string): Promise<InvitationView> {
  return invitationView(await usableInvitation(ctx.reads, ctx, token))
}

/** The invitation of a link that can still be used, else invitation-unusable: unknown, used and overdue links answer alike. */
export async function usableInvitation(reads: Reads, ctx: Context, token: string): Promise<InvitationRow> {
  const invitation = await findInvitationByTokenHash(reads, secretHash(token))
  if (!invitation || invitation.used_at !== null || Date.parse(invitation.expires_at) <= ctx.clock.nowMs()) {
    throw new AppError('invitation-unusable', 'It was used already, its time has run out, or the link is not complete. Ask an administrator for a new one, or sign in if you already have an account.')
  }
  return invitation
}
