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

export interface RowChoice {
  /** Leave out what was not sent. */
  isSentOnly: boolean
  limit: number
}

/** Rows behind a row number, in the order of the file. */
export async function listBatchRowsAfter(reads: Reads, batchId: string, { after, isSentOnly, limit }: RowChoice & { after: number }): Promise<BatchRowRecord[]> {
  let query = rowsOf(reads, batchId).where('batch_row.row_number', '>', after)
  if (isSentOnly) query = query.where('batch_row.state', '=', 'sent')
  return query.orderBy('batch_row.row_number').limit(limit).execute()
}

/** The rows that matter most, in the order of the file: the one named, those that are bad, those with a note, then from the top. */
export async function listForemostRows(reads: Reads, batchId: string, { isSentOnly, limit, rowId }: RowChoice & { rowId: string | null }): Promise<BatchRowRecord[]> {
  let query = rowsOf(reads, batchId)
  if (isSentOnly) query = query.where('batch_row.state', '=', 'sent')
  const rows = await query
    .orderBy(sql`batch_row.id IS ${rowId}`, 'desc')
    .orderBy(sql`batch_row.state = 'bad'`, 'desc')
    .orderBy(sql`(problems ->> '$.read' <> '[]' OR problems ->> '$.resolved' <> '[]')`, 'desc')
    .orderBy('batch_row.row_number')
    .limit(limit)
    .execute()
  return rows.sort((a, b) => a.row_number - b.row_number)
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
