import { mayReadBatch, mayReadDraftsAndRawFile } from '#shared/policies/reading'
import type { BatchForReading } from '#shared/policies/reading'
import { ROWS_IN_VIEW } from '#shared/schemas/batches'
import type { BatchRowView, BatchSummary, BatchView, CellProblem } from '#shared/schemas/batches'
import type { Context, Reads } from '../../context/context'
import { isOpenToOthers, mayWithdraw } from '../../domain/batch-state'
import { notFound } from '../../errors/app-error'
import { listPartOverviews } from '../../repositories/batch-part-repository'
import type { BatchPart, BatchPartOverview } from '../../repositories/batch-part-repository'
import { getBatchOverview } from '../../repositories/batch-repository'
import type { BatchOverview } from '../../repositories/batch-repository'
import { listForemostRows } from '../../repositories/batch-row-repository'
import type { BatchRowRecord } from '../../repositories/batch-row-repository'
import { getByteCount } from '../../repositories/raw-file-repository'
import { findTarget } from '../../repositories/target-repository'
import { keptProblems } from './draft-rows'

/** How a file was read, as kept with the batch. */
export interface KeptReading {
  reading: BatchView['reading']
  fileProblems: CellProblem[]
}

/** What a policy needs to know of a batch. */
export function batchForReading(batch: { owner_id: string }, parts: readonly Pick<BatchPart, 'sent_at' | 'programme_id'>[]): BatchForReading {
  const sent = parts.filter(part => part.sent_at !== null)
  return {
    ownerId: batch.owner_id,
    isOpenToOthers: isOpenToOthers(parts.map(part => ({ sentAt: part.sent_at }))),
    programmeIds: sent.map(part => part.programme_id),
  }
}

export function batchSummary(batch: BatchOverview, parts: readonly BatchPartOverview[]): BatchSummary {
  return {
    id: batch.id,
    number: batch.number,
    kind: batch.kind,
    fileName: batch.file_name,
    ownerName: batch.owner_name,
    createdAt: batch.created_at,
    rows: batch.rows,
    good: batch.good,
    bad: batch.bad,
    alreadyHere: batch.already_here,
    sent: batch.sent,
    parts: parts.map(part => ({
      targetId: part.target_id, targetName: part.target_name, state: part.state, measures: part.measures, lastReason: part.last_reason,
    })),
  }
}

export function rowView(row: BatchRowRecord): BatchRowView {
  const originalCells = JSON.parse(row.original_cells) as Record<string, string>
  const mended = row.mended_cells === null ? {} : (JSON.parse(row.mended_cells) as Record<string, string>)
  const { read, resolved } = keptProblems(row)
  return {
    id: row.id,
    rowNumber: row.row_number,
    state: row.state,
    targetName: row.target_name,
    cells: { ...originalCells, ...mended },
    originalCells,
    problems: [...read, ...resolved],
  }
}

/**
 * A batch as its page shows it: whole to its owner and the coordinators concerned, its sent rows to other signed-in people. Of
 * very many rows the foremost are shown, the one asked for among them.
 */
export async function viewBatch(ctx: Context, reads: Reads, batchId: string, rowId: string | null = null): Promise<BatchView> {
  const batch = await getBatchOverview(reads, batchId)
  const parts = await listPartOverviews(reads, [batchId])
  const forReading = batchForReading(batch, parts)
  if (!mayReadBatch(ctx.actor, forReading)) throw notFound()
  const isWhole = mayReadDraftsAndRawFile(ctx.actor, forReading)
  const rows = await listForemostRows(reads, batchId, { isSentOnly: !isWhole, limit: ROWS_IN_VIEW, rowId })
  const kept = JSON.parse(batch.reading) as KeptReading
  const target = batch.default_target_id === null ? undefined : await findTarget(reads, batch.default_target_id)
  const isMine = ctx.actor?.personId === batch.owner_id
  return {
    ...batchSummary(batch, parts),
    version: batch.version,
    sha256: batch.raw_sha256,
    byteCount: await getByteCount(reads, batch.raw_sha256),
    reading: kept.reading,
    fileProblems: kept.fileProblems,
    defaultTarget: target ? { id: target.id, name: target.name } : null,
    items: rows.map(rowView),
    rowsNotShown: (isWhole ? batch.rows : batch.sent) - rows.length,
    isMine,
    mayWithdraw: isMine && parts.some(part => mayWithdraw(part.state)),
  }
}
