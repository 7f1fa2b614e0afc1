import { readMeasuresInSteps } from '#shared/intake/read-measures'
import type { MeasureReading, MeasureRow } from '#shared/intake/read-measures'
import { ROW_SENTENCES } from '#shared/intake/sentences'
import { mayUpload } from '#shared/policies/uploading'
import { isAvailableKind, KIND_COMING } from '#shared/schemas/available-kinds'
import type { BatchView } from '#shared/schemas/batches'
import { mapInTurns, mapLazily, runInTurns } from '#shared/turns/turns'
import type { Kind } from '../../../fitting/types'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import type { DraftRow, Resolution } from '../../domain/resolve-row'
import { AppError, inputInvalid, notFound } from '../../errors/app-error'
import { insertBatch, nextBatchNumber } from '../../repositories/batch-repository'
import { insertBatchRows } from '../../repositories/batch-row-repository'
import { insertRawFile } from '../../repositories/raw-file-repository'
import { findTarget } from '../../repositories/target-repository'
import { viewBatch } from './batch-view'
import type { KeptReading } from './batch-view'
import { resolveDraftRows, settleDraftParts } from './draft-rows'
import type { KeptProblems } from './draft-rows'

export interface Upload {
  fileName: string
  kind: Kind
  /** Where rows without a target of their own belong. */
  targetId: string | null
  bytes: Buffer
  /** Of the bytes, 64 hexadecimal digits. */
  sha256: string
}

/**
 * Keeps a file byte for byte and reads its rows into a draft. Open to observers; records 'batch.uploaded'; throws
 * kind-not-available, file-unreadable or input-invalid, with nothing written.
 */
export async function uploadBatch(ctx: Context, upload: Upload): Promise<BatchView> {
  if (!ctx.actor || !mayUpload(ctx.actor)) throw notFound()
  refuseComingKind(upload.kind)
  await refuseUnfitTarget(ctx, upload)
  const read = await runInTurns(readMeasuresInSteps(upload.bytes, { kind: upload.kind, now: yearOf(ctx.clock.now()) }))
  refuseUnreadable(read)
  const rows = await mapInTurns(read.rows, row => ({ ...draftRow(ctx, row), cells: row.cells }))
  const frame = { kind: upload.kind, ownerId: ctx.actor.personId, defaultTargetId: upload.targetId }
  const resolutions = await resolveDraftRows(ctx.reads, frame, rows)

  const batchId = ctx.ids.newId()
  await keepBatch(ctx, { batchId, upload, read, rows, resolutions })
  return viewBatch(ctx, ctx.reads, batchId)
}

/** Known before a byte is read; the page and the route ask it as well. */
export function refuseComingKind(kind: Kind): void {
  if (!isAvailableKind(kind)) throw new AppError('kind-not-available', `${KIND_COMING.reason} ${KIND_COMING.remedy}`)
}

async function refuseUnfitTarget(ctx: Context, upload: Upload): Promise<void> {
  if (upload.targetId === null) return
  const target = await findTarget(ctx.reads, upload.targetId)
  if (!target) throw inputInvalid([{ path: 'targetId', reason: 'is no target here; choose one from the list' }])
  if (target.kind === upload.kind) return
  throw inputInvalid([{ path: 'targetId', reason: `${target.name} takes measures of the kind ${target.kind}, and the file is said to hold the kind ${upload.kind}` }])
}

function refuseUnreadable({ fileProblems, rows }: MeasureReading): void {
  const errors = fileProblems.filter(problem => problem.severity === 'error')
  if (rows.length > 0 && errors.length === 0) return
  throw new AppError('file-unreadable', errors.map(({ reason, remedy }) => `${reason} ${remedy}`).join(' '), {
    fields: errors.map(({ column, rowNumber, reason }) => ({ path: [rowNumber > 0 ? `row ${rowNumber}` : 'file', ...(column ? [column] : [])].join('.'), reason })),
  })
}

function yearOf(iso: string): number {
  const now = new Date(iso)
  const start = Date.UTC(now.getUTCFullYear(), 0)
  return now.getUTCFullYear() + (now.getTime() - start) / (Date.UTC(now.getUTCFullYear() + 1, 0) - start)
}

/** Which rows repeat others is decided with their targets known, and anew whenever a row is mended; so not kept from the reading. */
function draftRow(ctx: Context, row: MeasureRow): DraftRow {
  const repeats = row.duplicateOfRow === null ? null : ROW_SENTENCES.duplicateOfRow(row.duplicateOfRow).reason
  return {
    id: ctx.ids.newId(),
    rowNumber: row.rowNumber,
    parsed: row.parsed,
    problems: row.problems.filter(problem => problem.reason !== repeats),
  }
}

interface ReadBatch {
  batchId: string
  upload: Upload
  read: MeasureReading
  rows: readonly (DraftRow & { cells: Record<string, string> })[]
  resolutions: ReadonlyMap<string, Resolution>
}

async function keepBatch(ctx: Context, { batchId, upload, read, rows, resolutions }: ReadBatch): Promise<void> {
  const created_at = ctx.clock.now()
  const states = [...resolutions.values()].map(resolution => resolution.state)
  const count = (state: Resolution['state']) => states.filter(found => found === state).length
  await withTransaction(ctx, async (tx) => {
    const number = await nextBatchNumber(tx)
    await insertRawFile(tx, { sha256: upload.sha256, bytes: upload.bytes, created_at })
    await insertBatch(tx, {
      id: batchId,
      number,
      owner_id: ctx.actor!.personId,
      kind: upload.kind,
      file_name: upload.fileName,
      raw_sha256: upload.sha256,
      default_target_id: upload.targetId,
      column_mapping: JSON.stringify(Object.fromEntries(read.reading.columns.map(column => [column, column]))),
      reading: JSON.stringify({ reading: read.reading, fileProblems: read.fileProblems } satisfies KeptReading),
      created_at,
      discarded_at: null,
    })
    await insertBatchRows(tx, mapLazily(rows, (row) => {
      const { state, targetId, problems } = resolutions.get(row.id)!
      return {
        id: row.id,
        batch_id: batchId,
        row_number: row.rowNumber,
        state,
        target_id: targetId,
        original_cells: JSON.stringify(row.cells),
        mended_cells: null,
        parsed: row.parsed === null ? null : JSON.stringify(row.parsed),
        problems: JSON.stringify({ read: [...row.problems], resolved: problems } satisfies KeptProblems),
      }
    }))
    await settleDraftParts(tx, ctx, { batchId, targetIds: [...resolutions.values()].flatMap(resolution => resolution.targetId ?? []) })
    await recordAudit(tx, ctx, {
      event: 'batch.uploaded', subjectKind: 'batch', subjectId: batchId,
      detail: { number, sha256: upload.sha256, rows: rows.length, good: count('good'), bad: count('bad'), alreadyHere: count('already-here') },
    })
  })
}
