import { mayReadDraftsAndRawFile } from '#shared/policies/reading'
import type { BatchView } from '#shared/schemas/batches'
import type { Context } from '../../context/context'
import { notFound } from '../../errors/app-error'
import { listPartsOfBatch } from '../../repositories/batch-part-repository'
import { getBatch } from '../../repositories/batch-repository'
import { getRawFile } from '../../repositories/raw-file-repository'
import { batchForReading, viewBatch } from './batch-view'

/** A batch: its owner's at any time, once sent open to signed-in people; drafts and the file itself only to owner and coordinators. */
export async function readBatch(ctx: Context, batchId: string): Promise<BatchView> {
  return viewBatch(ctx, ctx.reads, batchId)
}

/** The file as it came, byte for byte. Open to the batch's owner and, once sent, to the programme's coordinators. */
export async function readRawFile(ctx: Context, batchId: string): Promise<{ bytes: Buffer; fileName: string; sha256: string }> {
  const batch = await getBatch(ctx.reads, batchId)
  const parts = await listPartsOfBatch(ctx.reads, batchId)
  if (!mayReadDraftsAndRawFile(ctx.actor, batchForReading(batch, parts))) throw notFound()
  const { bytes } = await getRawFile(ctx.reads, batch.raw_sha256)
  return { bytes, fileName: batch.file_name, sha256: batch.raw_sha256 }
}
