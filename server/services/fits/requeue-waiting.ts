import type { Context, Tx } from '../../context/context'
import { listSentPartsOfTarget } from '../../repositories/batch-part-repository'
import { getTarget } from '../../repositories/target-repository'
import { queueFit } from './queue-fit'
import type { QueuedFit } from './queue-fit'
import { supersedeWaitingFits } from './supersede-fits'

/**
 * After the standing measures or the accepted fit of a target changed: every waiting fit of it is superseded, and where sent
 * batches still wait, they are fitted anew. In the caller's transaction.
 */
export async function requeueWaiting(tx: Tx, ctx: Context, targetId: string): Promise<QueuedFit | null> {
  const parts = await listSentPartsOfTarget(tx, targetId)
  if (parts.length > 0) {
    const queued = await queueFit(tx, ctx, { target: await getTarget(tx, targetId), cause: 'requeued', requestedBy: null })
    if (queued) return queued
  }
  await supersedeWaitingFits(tx, ctx, targetId, null)
  return null
}
