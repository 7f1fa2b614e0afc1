import { COLUMNS } from '#shared/intake/columns'
import { readRow } from '#shared/intake/read-row'
import type { BatchView } from '#shared/schemas/batches'
import type { Kind } from '../../../fitting/types'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { inputInvalid, wrongState } from '../../errors/app-error'
import { listPartsOfBatch, updatePart } from '../../repositories/batch-part-repository'
import { raiseBatchVersion } from '../../repositories/batch-repository'
import { getBatchRow, updateBatchRow } from '../../repositories/batch-row-repository'
import { announceBatch } from './announce-batch'
import { viewBatch } from './batch-view'
import { settleDraftRows } from './draft-rows'
import type { KeptProblems } from './draft-rows'
import { ownBatch } from './own-batch'

/**
 * Replaces cells of a row that is not sent and reads it anew; what the file said is kept beside it. Open to the batch's owner;
 * records 'batch.row-mended'; throws wrong-state for a row that was sent.
 */
export async function mendRow(ctx: Context, { batchId, rowId, cells }: { batchId: string; rowId: string; cells: Record<string, string> }): Promise<BatchView> {
  return withTransaction(ctx, async (tx) => {
    const batch = await ownBatch(ctx, tx, batchId)
    const row = await getBatchRow(tx, batchId, rowId)
    if (row.state === 'sent') throw wrongState('This row was sent and can no longer be mended here. Withdraw the measures first, or wait until the coordinator has ruled.')
    refuseUnknownColumns(batch.kind, cells)
    const original = JSON.parse(row.original_cells) as Record<string, string>
    const mended = { ...(row.mended_cells === null ? {} : (JSON.parse(row.mended_cells) as Record<string, string>)), ...cells }
    const reading = readRow({ ...original, ...mended }, batch.kind, { rowNumber: row.row_number })
    await updateBatchRow(tx, rowId, {
      mended_cells: JSON.stringify(mended),
      parsed: reading.parsed === null ? null : JSON.stringify(reading.parsed),
      problems: JSON.stringify({ read: reading.problems, resolved: [] } satisfies KeptProblems),
    })
    await settleDraftRows(tx, ctx, batch)
    await reopenReturnedPart(tx, batchId, row.target_id)
    await raiseBatchVersion(tx, batchId)
    await recordAudit(tx, ctx, {
      event: 'batch.row-mended', subjectKind: 'batch', subjectId: batchId, targetId: row.target_id,
      detail: { rowNumber: row.row_number, columns: Object.keys(cells) },
    })
    announceBatch(ctx, batchId)
    return viewBatch(ctx, tx, batchId, rowId)
  })
}

function refuseUnknownColumns(kind: Kind, cells: Record<string, string>): void {
  const known = COLUMNS[kind].map(column => column.name as string)
  const unknown = Object.keys(cells).filter(column => !known.includes(column))
  if (unknown.length > 0) throw inputInvalid(unknown.map(column => ({ path: `cells.${column}`, reason: `is no column of the kind ${kind}` })))
}

/** Whoever begins to mend what came back has a draft again. */
async function reopenReturnedPart(tx: Tx, batchId: string, targetId: string | null): Promise<void> {
  const part = (await listPartsOfBatch(tx, batchId)).find(found => found.target_id === targetId)
  if (part?.state === 'returned') await updatePart(tx, part.id, { state: 'draft' })
}
