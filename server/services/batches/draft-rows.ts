import { nameKey } from '#shared/intake/name-key'
import type { ParsedRow } from '#shared/intake/parsed-row'
import type { CellProblem } from '#shared/schemas/batches'
import { createTurns, mapInTurns } from '#shared/turns/turns'
import type { Kind } from '../../../fitting/types'
import type { Context, Reads, Tx } from '../../context/context'
import { createRowJudge, placeRow } from '../../domain/resolve-row'
import type { DraftRow, KnownTarget, PlacedRow, Resolution, Surroundings } from '../../domain/resolve-row'
import { deleteDraftParts, insertParts, listPartsOfBatch } from '../../repositories/batch-part-repository'
import type { BatchRecord } from '../../repositories/batch-repository'
import { listBatchRows, updateRowDecisions } from '../../repositories/batch-row-repository'
import type { BatchRowRecord, RowDecision } from '../../repositories/batch-row-repository'
import { listKnownDuplicateKeys } from '../../repositories/measure-repository'
import { findTarget, mapTargetsByNameKey } from '../../repositories/target-repository'
import { ownObserverName } from './own-observer'

/** As kept beside a row: what reading it found, and what looking for its target and its like found. */
export interface KeptProblems {
  read: CellProblem[]
  resolved: CellProblem[]
}

export function keptProblems(row: Pick<BatchRowRecord, 'problems'>): KeptProblems {
  return JSON.parse(row.problems) as KeptProblems
}

export function parsedOf(row: Pick<BatchRowRecord, 'parsed'>): ParsedRow | null {
  return row.parsed === null ? null : (JSON.parse(row.parsed) as ParsedRow)
}

export function draftRowOf(row: BatchRowRecord): DraftRow {
  return { id: row.id, rowNumber: row.row_number, parsed: parsedOf(row), problems: keptProblems(row).read }
}

export interface BatchFrame {
  kind: Kind
  ownerId: string
  defaultTargetId: string | null
}

export function frameOf(batch: BatchRecord): BatchFrame {
  return { kind: batch.kind, ownerId: batch.owner_id, defaultTargetId: batch.default_target_id }
}

/** What rows of a batch find around them: targets by every name they use, and who is credited. */
export async function surroundingsOf(reads: Reads, frame: BatchFrame, rows: readonly DraftRow[]): Promise<Surroundings> {
  const names = new Set([...new Set(rows.map(row => row.parsed?.targetName ?? null))].flatMap(name => (name ? [nameKey(name)] : [])))
  const target = frame.defaultTargetId === null ? undefined : await findTarget(reads, frame.defaultTargetId)
  const defaultTarget: KnownTarget | null = target ? { id: target.id, name: target.name, kind: target.kind } : null
  return {
    kind: frame.kind,
    targetsByNameKey: await mapTargetsByNameKey(reads, [...names]),
    defaultTarget,
    ownObserverName: await ownObserverName(reads, frame.ownerId),
  }
}

/** Decides on every row that is not sent, against the targets and measures that are here now. */
export async function resolveDraftRows(reads: Reads, frame: BatchFrame, rows: readonly DraftRow[]): Promise<Map<string, Resolution>> {
  const around = await surroundingsOf(reads, frame, rows)
  const placed = await mapInTurns(rows, row => placeRow(row, around))
  const known = await knownKeys(reads, placed)
  const judge = createRowJudge((targetId, key) => known.get(targetId)?.has(key) === true)
  return new Map(await mapInTurns(placed, found => [found.row.id, judge(found)] as const))
}

/** Of each target the keys of these rows that it has already. */
async function knownKeys(reads: Reads, placed: readonly PlacedRow[]): Promise<Map<string, Set<string>>> {
  const keysByTarget = new Map<string, string[]>()
  for (const { targetId, key } of placed) {
    if (targetId === null || key === null) continue
    const keys = keysByTarget.get(targetId)
    if (keys) keys.push(key)
    else keysByTarget.set(targetId, [key])
  }
  const known = new Map<string, Set<string>>()
  for (const [targetId, keys] of keysByTarget) known.set(targetId, await listKnownDuplicateKeys(reads, targetId, keys))
  return known
}

/** Decides anew on the draft rows of a kept batch, writes what changed, and answers the rows as they are now. */
export async function settleDraftRows(tx: Tx, ctx: Context, batch: BatchRecord): Promise<BatchRowRecord[]> {
  const rows = await listBatchRows(tx, batch.id)
  const drafts = rows.filter(row => row.state !== 'sent')
  const resolutions = await resolveDraftRows(tx, frameOf(batch), await mapInTurns(drafts, draftRowOf))
  const changed: RowDecision[] = []
  const turns = createTurns()
  for (const row of drafts) {
    const { state, targetId, problems } = resolutions.get(row.id)!
    const text = JSON.stringify({ read: keptProblems(row).read, resolved: problems } satisfies KeptProblems)
    if (turns.isOver()) await turns.giveWay()
    if (row.state === state && row.target_id === targetId && row.problems === text) continue
    Object.assign(row, { state, target_id: targetId, problems: text })
    changed.push({ id: row.id, state, target_id: targetId, problems: text })
  }
  await updateRowDecisions(tx, changed)
  await settleDraftParts(tx, ctx, { batchId: batch.id, targetIds: drafts.flatMap(row => row.target_id ?? []) })
  return rows
}

/** Gives a batch one part for each target that its rows touch, and takes away drafts that no row belongs to any more. */
export async function settleDraftParts(tx: Tx, ctx: Context, { batchId, targetIds }: { batchId: string; targetIds: readonly string[] }): Promise<void> {
  const touched = new Set(targetIds)
  const parts = await listPartsOfBatch(tx, batchId)
  const missing = [...touched].filter(id => !parts.some(part => part.target_id === id))
  const idle = parts.filter(part => part.state === 'draft' && part.sent_at === null && !touched.has(part.target_id))
  await deleteDraftParts(tx, idle.map(part => part.id))
  await insertParts(tx, missing.map(target_id => ({
    id: ctx.ids.newId(), batch_id: batchId, target_id, state: 'draft' as const, sent_at: null, ruled_at: null,
  })))
}
