import type { Insertable, Selectable } from 'kysely'
import type { InvitationTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type InvitationRow = Selectable<InvitationTable>

export async function insertInvitation(tx: Tx, row: Insertable<InvitationTable>): Promise<void> {
  await tx.insertInto('invitation').values(row).execute()
}

export async function findInvitationByTokenHash(reads: Reads, tokenHash: string): Promise<InvitationRow | undefined> {
  return await reads.selectFrom('invitation').selectAll().where('token_hash', '=', tokenHash).executeTakeFirst()
}

/** Answers whether this call was the one that used it. */
export async function useInvitation(tx: Tx, id: string, personId: string, now: string): Promise<boolean> {
  const outcome = await tx.updateTable('invitation').set({ used_at: now, used_by: personId })
    .where('id', '=', id).where('used_at', 'is', null).executeTakeFirst()
  return outcome.numUpdatedRows === 1n
}

/** Takes back the unused invitations that the server itself made, for the first administrator. */
export async function deleteUnusedSystemInvitations(tx: Tx): Promise<void> {
  await tx.deleteFrom('invitation').where('created_by', 'is', null).where('used_at', 'is', null).execute()
}

/** Newest first, from before `before` (created, id) where given. */
export async function listInvitations(reads: Reads, { before, limit }: { before?: [string, string], limit: number }): Promise<InvitationRow[]> {
  return await reads.selectFrom('invitation').selectAll()
    .$if(before !== undefined, query => query.where(({ eb, refTuple, tuple }) => eb(refTuple('created_at', 'id'), '<', tuple(before![0], before![1]))))
    .orderBy('created_at', 'desc').orderBy('id', 'desc').limit(limit).execute()
}
