import { sql } from 'kysely'
import type { Insertable, Selectable, Updateable } from 'kysely'
import type { BatchTargetTable } from '../db/schema'
import type { Reads, Tx } from './connection'

/** A batch's part: what of one batch belongs to one target. */
export type BatchPart = Selectable<BatchTargetTable> & { target_name: string; programme_id: string }

/** A part with the number of its measures and the reason of the last ruling on it, unless it was sent again since. */
export interface BatchPartOverview extends BatchPart {
  measures: number
  last_reason: string | null
}

function parts(reads: Reads) {
  return reads
    .selectFrom('batch_target')
    .innerJoin('target', 'target.id', 'batch_target.target_id')
    .selectAll('batch_target')
    .select(['target.name as target_name', 'target.programme_id'])
}

export async function insertParts(tx: Tx, rows: readonly Insertable<BatchTargetTable>[]): Promise<void> {
  if (rows.length > 0) await tx.insertInto('batch_target').values([...rows]).execute()
}

export async function updatePart(tx: Tx, partId: string, change: Updateable<BatchTargetTable>): Promise<void> {
  await tx.updateTable('batch_target').set(change).set(eb => ({ version: eb('version', '+', 1) })).where('id', '=', partId).execute()
}

/** Only for drafts that no row belongs to any more. */
export async function deleteDraftParts(tx: Tx, partIds: readonly string[]): Promise<void> {
  if (partIds.length === 0) return
  await tx.deleteFrom('batch_target').where('id', 'in', [...partIds]).where('state', '=', 'draft').where('sent_at', 'is', null).execute()
}

export async function listPartsOfBatch(reads: Reads, batchId: string): Promise<BatchPart[]> {
  return parts(reads).where('batch_target.batch_id', '=', batchId).orderBy('target.name').execute()
}

/** Parts that were sent to a target and wait for a ruling. */
export async function listSentPartsOfTarget(reads: Reads, targetId: string): Promise<BatchPart[]> {
  return parts(reads)
    .where('batch_target.target_id', '=', targetId)
    .where('batch_target.state', '=', 'sent')
    .orderBy('batch_target.sent_at')
    .orderBy('batch_target.id')
    .execute()
}

export async function listPartOverviews(reads: Reads, batchIds: readonly string[]): Promise<BatchPartOverview[]> {
  if (batchIds.length === 0) return []
  return parts(reads)
    .select([
      sql<number>`(SELECT count(*) FROM batch_row r WHERE r.batch_id = batch_target.batch_id
        AND r.target_id = batch_target.target_id AND r.state IN ('good', 'sent'))`.as('measures'),
      sql<string | null>`(SELECT u.reason FROM fit_batch_target f JOIN ruling u ON u.fit_id = f.fit_id
        WHERE f.batch_target_id = batch_target.id AND u.decision <> 'consent' AND batch_target.state NOT IN ('sent', 'withdrawn')
        ORDER BY u.created_at DESC, u.id LIMIT 1)`.as('last_reason'),
    ])
    .where(sql<boolean>`batch_target.batch_id IN (SELECT value FROM json_each(${JSON.stringify(batchIds)}))`)
    .orderBy('target.name')
    .execute()
}
