import { sql } from 'kysely'
import type { Insertable, Selectable } from 'kysely'
import type { BatchTable } from '../db/schema'
import { notFound } from '../errors/app-error'
import type { Reads, Tx } from './connection'

export type BatchRecord = Selectable<BatchTable> & { owner_name: string }

/** A batch with the number of its rows in each state. */
export interface BatchOverview extends BatchRecord {
  rows: number
  good: number
  bad: number
  already_here: number
  sent: number
}

export interface BatchFilter {
  ownerId: string
  /** Also batches of others that were sent to targets of these programmes. */
  programmeIds: readonly string[]
  /** Batches with a lower number only. */
  before?: number
  limit: number
}

export async function nextBatchNumber(tx: Tx): Promise<number> {
  const row = await tx.selectFrom('batch').select(tx.fn.max('number').as('last')).executeTakeFirst()
  return (row?.last ?? 0) + 1
}

export async function insertBatch(tx: Tx, batch: Insertable<BatchTable>): Promise<void> {
  await tx.insertInto('batch').values(batch).execute()
}

export async function findBatch(reads: Reads, id: string): Promise<BatchRecord | undefined> {
  return reads
    .selectFrom('batch')
    .innerJoin('person', 'person.id', 'batch.owner_id')
    .selectAll('batch')
    .select('person.display_name as owner_name')
    .where('batch.id', '=', id)
    .where('batch.discarded_at', 'is', null)
    .executeTakeFirst()
}

export async function getBatch(reads: Reads, id: string): Promise<BatchRecord> {
  const batch = await findBatch(reads, id)
  if (!batch) throw notFound()
  return batch
}

export async function updateDefaultTarget(tx: Tx, batchId: string, targetId: string): Promise<void> {
  await tx.updateTable('batch').set({ default_target_id: targetId }).where('id', '=', batchId).execute()
}

export async function raiseBatchVersion(tx: Tx, batchId: string): Promise<void> {
  await tx.updateTable('batch').set(eb => ({ version: eb('version', '+', 1) })).where('id', '=', batchId).execute()
}

export async function markBatchDiscarded(tx: Tx, batchId: string, at: string): Promise<void> {
  await tx.updateTable('batch').set({ discarded_at: at }).where('id', '=', batchId).execute()
}

function overview(reads: Reads) {
  return reads
    .selectFrom('batch')
    .innerJoin('person', 'person.id', 'batch.owner_id')
    .selectAll('batch')
    .select('person.display_name as owner_name')
    // Each counted in its index, and only for the batches that are listed.
    .select([
      sql<number>`(SELECT count(*) FROM batch_row r WHERE r.batch_id = batch.id)`.as('rows'),
      sql<number>`(SELECT count(*) FROM batch_row r WHERE r.batch_id = batch.id AND r.state = 'good')`.as('good'),
      sql<number>`(SELECT count(*) FROM batch_row r WHERE r.batch_id = batch.id AND r.state = 'bad')`.as('bad'),
      sql<number>`(SELECT count(*) FROM batch_row r WHERE r.batch_id = batch.id AND r.state = 'already-here')`.as('already_here'),
      sql<number>`(SELECT count(*) FROM batch_row r WHERE r.batch_id = batch.id AND r.state = 'sent')`.as('sent'),
    ])
    .where('batch.discarded_at', 'is', null)
}

export async function getBatchOverview(reads: Reads, id: string): Promise<BatchOverview> {
  const row = await overview(reads).where('batch.id', '=', id).executeTakeFirst()
  if (!row) throw notFound()
  return row
}

export async function listBatchOverviews(reads: Reads, filter: BatchFilter): Promise<BatchOverview[]> {
  let query = overview(reads).where(sql<boolean>`(batch.owner_id = ${filter.ownerId} OR EXISTS (
    SELECT 1 FROM batch_target p JOIN target t ON t.id = p.target_id
    WHERE p.batch_id = batch.id AND p.sent_at IS NOT NULL
      AND t.programme_id IN (SELECT value FROM json_each(${JSON.stringify(filter.programmeIds)}))))`)
  if (filter.before !== undefined) query = query.where('batch.number', '<', filter.before)
  return query.orderBy('batch.number', 'desc').limit(filter.limit).execute()
}
