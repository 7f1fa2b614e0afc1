import { mayChangeBatch } from '#shared/policies/uploading'
import type { Context, Reads } from '../../context/context'
import { notFound } from '../../errors/app-error'
import { findBatch } from '../../repositories/batch-repository'
import type { BatchRecord } from '../../repositories/batch-repository'

/** The batch, where the actor is the observer who owns it; for everybody else it is not there. */
export async function ownBatch(ctx: Context, reads: Reads, batchId: string): Promise<BatchRecord> {
  const batch = await findBatch(reads, batchId)
  if (!batch || !mayChangeBatch(ctx.actor, { ownerId: batch.owner_id })) throw notFound()
  return batch
}
