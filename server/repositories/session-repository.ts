import type { Insertable, Selectable } from 'kysely'
import type { SessionTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type SessionRow = Selectable<SessionTable>

export async function insertSession(tx: Tx, row: Insertable<SessionTable>): Promise<void> {
  await tx.insertInto('session').values(row).execute()
}

export async function findSession(reads: Reads, id: string): Promise<SessionRow | undefined> {
  return await reads.selectFrom('session').selectAll().where('id', '=', id).executeTakeFirst()
}

export async function touchSession(tx: Tx, id: string, now: string): Promise<void> {
  await tx.updateTable('session').set({ last_seen_at: now }).where('id', '=', id).execute()
}

export async function revokeSession(tx: Tx, id: string, now: string): Promise<number> {
  const outcome = await tx.updateTable('session').set({ revoked_at: now }).where('id', '=', id).where('revoked_at', 'is', null).executeTakeFirst()
  return Number(outcome.numUpdatedRows)
}

/** Ends all of a person's sessions, but for one where given; answers how many. */
export async function revokeSessionsOf(tx: Tx, personId: string, now: string, { except }: { except?: string } = {}): Promise<number> {
  const outcome = await tx.updateTable('session').set({ revoked_at: now })
    .where('person_id', '=', personId).where('revoked_at', 'is', null)
    .$if(except !== undefined, query => query.where('id', '!=', except!))
    .executeTakeFirst()
  return Number(outcome.numUpdatedRows)
}
