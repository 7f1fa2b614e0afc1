import { mayReadBatch, mayReadDraftsAndRawFile } from '#shared/policies/reading'
import type { BatchRowView, BatchView } from '#shared/schemas/batches'
import type { Page } from '#shared/schemas/ids'
import type { Context } from '../../context/context'
import { notFound } from '../../errors/app-error'
import { listPartsOfBatch } from '../../repositories/batch-part-repository'
import { getBatch } from '../../repositories/batch-repository'
import { listBatchRowsAfter } from '../../repositories/batch-row-repository'
import { decodeCursor, DEFAULT_LIMIT, pageOf } from '../../repositories/cursor'
import type { PageQuery } from '../../repositories/cursor'
import { getRawFile } from '../../repositories/raw-file-repository'
import { batchForReading, rowView, viewBatch } from './batch-view'

/** A batch: its owner's at any time, once sent open to signed-in people; drafts and the file itself only to owner and coordinators. */
export async function readBatch(ctx: Context, batchId: string): Promise<BatchView> {
  return viewBatch(ctx, ctx.reads, batchId)
}

/** All rows of a batch page by page, in the order of the file; open as the batch is. */
export async function listRowsOfBatch(ctx: Context, batchId: string, { cursor, limit = DEFAULT_LIMIT }: PageQuery): Promise<Page<BatchRowView>> {
  const batch = await getBatch(ctx.reads, batchId)
  const forReading = batchForReading(batch, await listPartsOfBatch(ctx.reads, batchId))
  if (!mayReadBatch(ctx.actor, forReading)) throw notFound()
  const rows = await listBatchRowsAfter(ctx.reads, batchId, {
    after: cursor === undefined ? 0 : decodeCursor(cursor, ['number'])[0],
    isSentOnly: !mayReadDraftsAndRawFile(ctx.actor, forReading),
    limit: limit + 1,
  })
  return pageOf(rows, limit, { keyOf: row => [row.row_number], itemOf: rowView })
}

/** The file as it came, byte for byte. Open to the batch's owner and, once sent, to the programme's coordinators. */
export async function readRawFile(ctx: Context, batchId: string): Promise<{ bytes: Buffer; fileName: string; sha256: string }> {
  const batch = await getBatch(ctx.reads, batchId)
  const parts = await listPartsOfBatch(ctx.reads, batchId)
  if (!mayReadDraftsAndRawFile(ctx.actor, batchForReading(batch, parts))) throw notFound()
  const { bytes } = await getRawFile(ctx.reads, batch.raw_sha256)
  return { bytes, fileName: batch.file_name, sha256: batch.raw_sha256 }
}
