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

export async function insertObserver(tx: Tx, row: Insertable<ObserverTable>): Promise<void> {
  await tx.insertInto('observer').values(row).execute()
}
