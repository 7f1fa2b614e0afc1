import type { BatchView } from '#shared/schemas/batches'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { inputInvalid } from '../../errors/app-error'
import { getBatch, raiseBatchVersion, updateDefaultTarget } from '../../repositories/batch-repository'
import { findTarget } from '../../repositories/target-repository'
import { announceBatch } from './announce-batch'
import { viewBatch } from './batch-view'
import { settleDraftRows } from './draft-rows'
import { ownBatch } from './own-batch'

/**
 * Says to which target the rows belong that name none, and decides on them anew. Open to the batch's owner; records
 * 'batch.target-chosen'; throws input-invalid for a target that is not there or of another kind.
 */
export async function chooseTarget(ctx: Context, { batchId, targetId }: { batchId: string; targetId: string }): Promise<BatchView> {
  return withTransaction(ctx, async (tx) => {
    const batch = await ownBatch(ctx, tx, batchId)
    const target = await findTarget(tx, targetId)
    if (!target) throw inputInvalid([{ path: 'targetId', reason: 'is no target here; choose one from the list' }])
    if (target.kind !== batch.kind) {
      throw inputInvalid([{ path: 'targetId', reason: `${target.name} takes measures of the kind ${target.kind}, and this file holds the kind ${batch.kind}` }])
    }
    await updateDefaultTarget(tx, batchId, targetId)
    await settleDraftRows(tx, ctx, await getBatch(tx, batchId))
    await raiseBatchVersion(tx, batchId)
    await recordAudit(tx, ctx, { event: 'batch.target-chosen', subjectKind: 'batch', subjectId: batchId, targetId, detail: { targetId } })
    announceBatch(ctx, batchId)
    return viewBatch(ctx, tx, batchId)
  })
}
