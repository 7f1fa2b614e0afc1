import { sql } from 'kysely'
import type { Insertable, Selectable } from 'kysely'
import type { ObserverTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type ObserverRow = Selectable<ObserverTable>

export async function findObserverOfPerson(reads: Reads, personId: string): Promise<ObserverRow | undefined> {
  return reads.selectFrom('observer').selectAll().where('person_id', '=', personId).executeTakeFirst()
}

export async function findObserverByNameKey(reads: Reads, nameKey: string): Promise<ObserverRow | undefined> {
  return reads.selectFrom('observer').selectAll().where('name_key', '=', nameKey).executeTakeFirst()
}

export async function mapObserversByNameKey(reads: Reads, nameKeys: readonly string[]): Promise<Map<string, ObserverRow>> {
  if (nameKeys.length === 0) return new Map()
  const rows = await reads
    .selectFrom('observer')
    .selectAll()
    .where(sql<boolean>`name_key IN (SELECT value FROM json_each(${JSON.stringify(nameKeys)}))`)
    .execute()
  return new Map(rows.map(row => [row.name_key, row]))
}

export async function insertObserver(tx: Tx, row: Insertable<ObserverTable>): Promise<void> {
  await tx.insertInto('observer').values(row).execute()
}

/** Ties an observer that had no account to the person who now has one. */
export async function updateObserverPerson(tx: Tx, observerId: string, personId: string): Promise<void> {
  await tx.updateTable('observer').set({ person_id: personId }).where('id', '=', observerId).execute()
}
