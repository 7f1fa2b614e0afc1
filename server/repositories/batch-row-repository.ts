import { sql } from 'kysely'
import type { Insertable, Selectable, Updateable } from 'kysely'
import type { BatchRowTable } from '../db/schema'
import { notFound } from '../errors/app-error'
import type { Reads, Tx } from './connection'
import { inParts, readInPages } from './in-pages'
import { insertMany } from './insert-many'

export type BatchRowRecord = Selectable<BatchRowTable> & { target_name: string | null }
export type NewBatchRow = Insertable<BatchRowTable>

export async function insertBatchRows(tx: Tx, rows: Iterable<NewBatchRow>): Promise<void> {
  await insertMany(tx, 'batch_row', rows)
}

function rowsOf(reads: Reads, batchId: string) {
  return reads
    .selectFrom('batch_row')
    .leftJoin('target', 'target.id', 'batch_row.target_id')
    .selectAll('batch_row')
    .select('target.name as target_name')
    .where('batch_row.batch_id', '=', batchId)
}

export async function listBatchRows(reads: Reads, batchId: string): Promise<BatchRowRecord[]> {
  return readInPages<BatchRowRecord, number>(
    ({ after, limit }) => rowsOf(reads, batchId).where('batch_row.row_number', '>', after ?? 0).orderBy('batch_row.row_number').limit(limit).execute(),
    row => row.row_number,
  )
}

export async function getBatchRow(reads: Reads, batchId: string, rowId: string): Promise<BatchRowRecord> {
  const row = await rowsOf(reads, batchId).where('batch_row.id', '=', rowId).executeTakeFirst()
  if (!row) throw notFound()
  return row
}

export async function updateBatchRow(tx: Tx, rowId: string, change: Updateable<BatchRowTable>): Promise<void> {
  await tx.updateTable('batch_row').set(change).where('id', '=', rowId).execute()
}

export interface RowDecision {
  id: string
  state: BatchRowTable['state']
  target_id: string | null
  problems: string
}

/** Writes what was decided on many rows at once. */
export async function updateRowDecisions(tx: Tx, decisions: readonly RowDecision[]): Promise<void> {
  await inParts(decisions, async (part) => {
    await sql`UPDATE batch_row SET state = d.value ->> 'state', target_id = d.value ->> 'target_id', problems = d.value ->> 'problems'
      FROM json_each(${JSON.stringify(part)}) AS d WHERE batch_row.id = d.value ->> 'id'`.execute(tx)
    return []
  })
}

export async function updateRowStates(tx: Tx, rowIds: readonly string[], state: BatchRowTable['state']): Promise<void> {
  await inParts(rowIds, part => tx
    .updateTable('batch_row')
    .set({ state })
    .where(sql<boolean>`id IN (SELECT value FROM json_each(${JSON.stringify(part)}))`)
    .execute())
}
