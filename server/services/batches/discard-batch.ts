import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { mayDiscard } from '../../domain/batch-state'
import { wrongState } from '../../errors/app-error'
import { listPartsOfBatch } from '../../repositories/batch-part-repository'
import { markBatchDiscarded } from '../../repositories/batch-repository'
import { announceBatch } from './announce-batch'
import { ownBatch } from './own-batch'

/** Throws a draft away; the raw file is kept. Open to the batch's owner; records 'batch.discarded'; throws wrong-state once anything of it was sent. */
export async function discardBatch(ctx: Context, batchId: string): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    const batch = await ownBatch(ctx, tx, batchId)
    const parts = await listPartsOfBatch(tx, batchId)
    if (!mayDiscard(parts.map(part => part.state)) || parts.some(part => part.sent_at !== null)) {
      throw wrongState('Measures of this batch were sent, so it can no longer be thrown away. What still waits can be withdrawn.')
    }
    await markBatchDiscarded(tx, batchId, ctx.clock.now())
    await recordAudit(tx, ctx, { event: 'batch.discarded', subjectKind: 'batch', subjectId: batchId, detail: { number: batch.number } })
    announceBatch(ctx, batchId)
  })
}
