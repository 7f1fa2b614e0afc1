import type { Reads, Tx } from './connection'

export async function isFollowing(reads: Reads, personId: string, targetId: string): Promise<boolean> {
  const row = await reads.selectFrom('follow').select('person_id').where('person_id', '=', personId).where('target_id', '=', targetId).executeTakeFirst()
  return row !== undefined
}

/** True where the follow is new. */
export async function insertFollow(tx: Tx, follow: { person_id: string; target_id: string; created_at: string }): Promise<boolean> {
  const outcome = await tx.insertInto('follow').values(follow).onConflict(c => c.doNothing()).executeTakeFirst()
  return (outcome.numInsertedOrUpdatedRows ?? 0n) > 0n
}

/** True where there was something to delete. */
export async function deleteFollow(tx: Tx, personId: string, targetId: string): Promise<boolean> {
  const outcome = await tx.deleteFrom('follow').where('person_id', '=', personId).where('target_id', '=', targetId).executeTakeFirst()
  return outcome.numDeletedRows > 0n
}
