import type { Insertable, Selectable } from 'kysely'
import type { RulingTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type RulingRecord = Selectable<RulingTable> & { person_name: string }

export async function insertRuling(tx: Tx, ruling: Insertable<RulingTable>): Promise<void> {
  await tx.insertInto('ruling').values(ruling).execute()
}

export async function listRulings(reads: Reads, fitId: string): Promise<RulingRecord[]> {
  return reads
    .selectFrom('ruling')
    .innerJoin('person', 'person.id', 'ruling.person_id')
    .selectAll('ruling')
    .select('person.display_name as person_name')
    .where('ruling.fit_id', '=', fitId)
    .orderBy('ruling.created_at')
    .orderBy('ruling.id')
    .execute()
}
