import { sql } from 'kysely'
import type { Insertable, Selectable, Updateable } from 'kysely'
import type { BatchRowTable } from '../db/schema'
import { notFound } from '../errors/app-error'
import type { Reads, Tx } from './connection'

export type BatchRowRecord = Selectable<BatchRowTable> & { target_name: string | null }
export type NewBatchRow = Insertable<BatchRowTable>

/** A statement takes 32,766 values, and a row has nine. */
const ROWS_A_STATEMENT = 1000

export async function insertBatchRows(tx: Tx, rows: readonly NewBatchRow[]): Promise<void> {
  for (let start = 0; start < rows.length; start += ROWS_A_STATEMENT) {
    await tx.insertInto('batch_row').values(rows.slice(start, start + ROWS_A_STATEMENT)).execute()
  }
}

export async function listBatchRows(reads: Reads, batchId: string): Promise<BatchRowRecord[]> {
  return reads
    .selectFrom('batch_row')
    .leftJoin('target', 'target.id', 'batch_row.target_id')
    .selectAll('batch_row')
    .select('target.name as target_name')
    .where('batch_row.batch_id', '=', batchId)
    .orderBy('batch_row.row_number')
    .execute()
}

export async function getBatchRow(reads: Reads, batchId: string, rowId: string): Promise<BatchRowRecord> {
  const row = await reads
    .selectFrom('batch_row')
    .leftJoin('target', 'target.id', 'batch_row.target_id')
    .selectAll('batch_row')
    .select('target.name as target_name')
    .where('batch_row.id', '=', rowId)
    .where('batch_row.batch_id', '=', batchId)
    .executeTakeFirst()
  if (!row) throw notFound()
  return row
}

export async function updateBatchRow(tx: Tx, rowId: string, change: Updateable<BatchRowTable>): Promise<void> {
  await tx.updateTable('batch_row').set(change).where('id', '=', rowId).execute()
}

export async function updateRowStates(tx: Tx, rowIds: readonly string[], state: BatchRowTable['state']): Promise<void> {
  await tx
    .updateTable('batch_row')
    .set({ state })
    .where(sql<boolean>`id IN (SELECT value FROM json_each(${JSON.stringify(rowIds)}))`)
    .execute()
}
