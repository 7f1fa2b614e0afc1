import { nameKey } from '#shared/intake/name-key'
import type { SendOutcome } from '#shared/schemas/batches'
import { mapInTurns, mapLazily } from '#shared/turns/turns'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { maySend } from '../../domain/batch-state'
import { measureKey } from '../../domain/resolve-row'
import { nothingNewSentence, sendSentence } from '../../domain/send-sentence'
import type { SendCounts } from '../../domain/send-sentence'
import { AppError } from '../../errors/app-error'
import { listPartsOfBatch, updatePart } from '../../repositories/batch-part-repository'
import type { BatchPart } from '../../repositories/batch-part-repository'
import { raiseBatchVersion } from '../../repositories/batch-repository'
import type { BatchRecord } from '../../repositories/batch-repository'
import { updateRowStates } from '../../repositories/batch-row-repository'
import type { BatchRowRecord } from '../../repositories/batch-row-repository'
import { measureColumns } from '../../repositories/measure-columns'
import { insertMeasureObservers, insertMeasures } from '../../repositories/measure-repository'
import { getTarget } from '../../repositories/target-repository'
import { queueFit } from '../fits/queue-fit'
import { announceBatch } from './announce-batch'
import { parsedOf, settleDraftRows } from './draft-rows'
import { creditObservers, ownObserverName } from './own-observer'
import { ownBatch } from './own-batch'

/**
 * Sends the good rows of a batch: they become measures and one fit is queued for each target they touch; the rest stays a
 * draft. Open to the batch's owner; records 'batch.sent' and 'fit.requested'; throws nothing-to-send where nothing is new.
 */
export async function sendBatch(ctx: Context, batchId: string): Promise<SendOutcome> {
  return withTransaction(ctx, async (tx) => {
    const batch = await ownBatch(ctx, tx, batchId)
    const rows = await settleDraftRows(tx, ctx, batch)
    const parts = new Map((await listPartsOfBatch(tx, batchId)).map(part => [part.target_id, part]))
    const good = rows.filter(row => row.state === 'good' && maySend(parts.get(row.target_id!)!.state))
    const counts = countRows(rows, good)
    if (good.length === 0) throw new AppError('nothing-to-send', nothingNewSentence(counts))

    await keepMeasures(tx, ctx, batch, good)
    await updateRowStates(tx, good.map(row => row.id), 'sent')
    const touched = [...new Set(good.map(row => row.target_id!))].map(targetId => parts.get(targetId)!)
    await markSent(tx, ctx, touched)
    await raiseBatchVersion(tx, batchId)
    await recordAudit(tx, ctx, { event: 'batch.sent', subjectKind: 'batch', subjectId: batchId, detail: { number: batch.number, ...counts } })
    const fits = await queueFits(tx, ctx, batch, touched)
    announceBatch(ctx, batchId)
    return { ...counts, sentence: sendSentence(counts), fits }
  })
}

function countRows(rows: readonly BatchRowRecord[], good: readonly BatchRowRecord[]): SendCounts {
  const alreadyHere = rows.filter(row => row.state === 'already-here').length
  const earlier = rows.filter(row => row.state === 'sent').length
  return { sent: good.length, alreadyHere: alreadyHere + (good.length === 0 ? earlier : 0), keptAsDraft: rows.length - earlier - good.length - alreadyHere }
}

async function keepMeasures(tx: Tx, ctx: Context, batch: BatchRecord, rows: readonly BatchRowRecord[]): Promise<void> {
  const own = await ownObserverName(tx, batch.owner_id)
  const measures = await mapInTurns(rows, (row) => {
    const parsed = parsedOf(row)!
    return { id: ctx.ids.newId(), row, parsed, observerName: parsed.observerName ?? own }
  })
  const observerIds = await creditObservers(tx, ctx, { personId: batch.owner_id, names: new Set(measures.map(measure => measure.observerName)) })
  await insertMeasures(tx, mapLazily(measures, ({ id, row, parsed }) => ({
    ...measureColumns(parsed),
    id,
    lineage_id: id,
    target_id: row.target_id!,
    batch_id: batch.id,
    batch_row_id: row.id,
    duplicate_key: measureKey(parsed, { ownObserverName: own }),
    original_cells: row.original_cells,
    author_id: batch.owner_id,
    created_at: ctx.clock.now(),
  })))
  await insertMeasureObservers(tx, mapLazily(measures, ({ id, observerName }) => ({ measure_id: id, observer_id: observerIds.get(nameKey(observerName))! })))
}

async function markSent(tx: Tx, ctx: Context, parts: readonly BatchPart[]): Promise<void> {
  for (const part of parts) await updatePart(tx, part.id, { state: 'sent', sent_at: ctx.clock.now(), ruled_at: null })
}

async function queueFits(tx: Tx, ctx: Context, batch: BatchRecord, parts: readonly BatchPart[]): Promise<SendOutcome['fits']> {
  const fits: SendOutcome['fits'] = []
  for (const part of parts) {
    const target = await getTarget(tx, part.target_id)
    const queued = await queueFit(tx, ctx, { target, cause: 'batch-sent', requestedBy: batch.owner_id })
    if (queued) fits.push({ fitId: queued.fitId, targetId: target.id, targetName: target.name })
  }
  return fits
}
