import type { Decision } from '#shared/schemas/fits'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { batchStateAfter } from '../../domain/fit-state'
import { updatePart } from '../../repositories/batch-part-repository'
import { raiseBatchVersion } from '../../repositories/batch-repository'
import { updateRowStates } from '../../repositories/batch-row-repository'
import { listFitBatches } from '../../repositories/fit-content-repository'
import type { FitBatchRecord } from '../../repositories/fit-content-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import { announceBatch } from '../batches/announce-batch'
import { withdrawMeasures } from '../batches/withdraw-measures'

export interface SettledBatch {
  id: string
  number: number
  fileName: string
  ownerId: string
}

/**
 * Gives every part that waited on a fit the state its ruling brings, in the caller's transaction. What is returned or declined
 * stands no longer; returned rows are a draft again, so that their owner can mend and send them.
 */
export async function settleParts(tx: Tx, ctx: Context, { fit, decision, reason }: { fit: FitRecord; decision: Decision; reason: string }): Promise<SettledBatch[]> {
  const state = batchStateAfter(decision)
  const waiting = (await listFitBatches(tx, fit.id)).filter(batch => batch.state === 'sent')
  for (const batch of waiting) {
    if (decision !== 'accept') {
      const rowIds = await withdrawMeasures(tx, ctx, { batchId: batch.id, targetId: fit.target_id })
      if (decision === 'return') await updateRowStates(tx, rowIds, 'good')
    }
    await updatePart(tx, batch.batch_target_id, { state, ruled_at: ctx.clock.now() })
    await raiseBatchVersion(tx, batch.id)
    await recordBatchRuling(tx, ctx, batch, { fit, decision, reason })
    announceBatch(ctx, batch.id)
  }
  return waiting.map(batch => ({ id: batch.id, number: batch.number, fileName: batch.file_name, ownerId: batch.owner_id }))
}

async function recordBatchRuling(tx: Tx, ctx: Context, batch: FitBatchRecord, { fit, decision, reason }: { fit: FitRecord; decision: Decision; reason: string }): Promise<void> {
  const subject = { subjectKind: 'batch', subjectId: batch.id, targetId: fit.target_id } as const
  if (decision === 'accept') await recordAudit(tx, ctx, { ...subject, event: 'batch.accepted', detail: { number: batch.number, fitId: fit.id } })
  else await recordAudit(tx, ctx, { ...subject, event: decision === 'return' ? 'batch.returned' : 'batch.declined', detail: { number: batch.number, fitId: fit.id, reason } })
}
