import type { BatchView } from '#shared/schemas/batches'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { mayWithdraw } from '../../domain/batch-state'
import { notFound, wrongState } from '../../errors/app-error'
import { listPartsOfBatch, updatePart } from '../../repositories/batch-part-repository'
import { raiseBatchVersion } from '../../repositories/batch-repository'
import { requeueWaiting } from '../fits/requeue-waiting'
import { announceBatch } from './announce-batch'
import { viewBatch } from './batch-view'
import { ownBatch } from './own-batch'
import { withdrawMeasures } from './withdraw-measures'

/**
 * Takes back what a batch sent to one target and nobody has ruled on: its measures no longer stand, and what else waits for
 * that target is fitted anew without them. Open to the batch's owner; records 'batch.withdrawn'; throws wrong-state after a ruling.
 */
export async function withdrawBatch(ctx: Context, { batchId, targetId }: { batchId: string; targetId: string }): Promise<BatchView> {
  return withTransaction(ctx, async (tx) => {
    const batch = await ownBatch(ctx, tx, batchId)
    const part = (await listPartsOfBatch(tx, batchId)).find(found => found.target_id === targetId)
    if (!part) throw notFound()
    if (!mayWithdraw(part.state)) {
      throw wrongState(`The measures of ${part.target_name} in this batch are ${part.state}; only what was sent and waits can be withdrawn.`)
    }
    await withdrawMeasures(tx, ctx, { batchId, targetId })
    await updatePart(tx, part.id, { state: 'withdrawn', ruled_at: ctx.clock.now() })
    await raiseBatchVersion(tx, batchId)
    await recordAudit(tx, ctx, { event: 'batch.withdrawn', subjectKind: 'batch', subjectId: batchId, targetId, detail: { number: batch.number } })
    await requeueWaiting(tx, ctx, targetId)
    announceBatch(ctx, batchId)
    return viewBatch(ctx, tx, batchId)
  })
}
