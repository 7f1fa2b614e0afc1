import type { Kind } from '../../fitting/types'
import { duplicateKey } from '../../shared/intake/duplicate-key'
import { nameKey } from '../../shared/intake/name-key'
import type { ParsedRow } from '../../shared/intake/parsed-row'
import { ROW_SENTENCES } from '../../shared/intake/sentences'
import type { CellProblem } from '../../shared/schemas/batches'
import { KIND_TEXT } from '../../shared/units/kind-text'

/** A row of a draft as it was read, with what reading it found. */
export interface DraftRow {
  id: string
  rowNumber: number
  parsed: ParsedRow | null
  problems: readonly CellProblem[]
}

export interface KnownTarget {
  id: string
  name: string
  kind: Kind
}

/** What a row turns out to be among the targets and measures that are here. */
export interface Resolution {
  state: 'good' | 'bad' | 'already-here'
  targetId: string | null
  problems: CellProblem[]
}

export interface Surroundings {
  kind: Kind
  targetsByNameKey: ReadonlyMap<string, KnownTarget>
  defaultTarget: KnownTarget | null
  /** Who is credited where the row names nobody. */
  ownObserverName: string
}

export function hasErrors(problems: readonly CellProblem[]): boolean {
  return problems.some(problem => problem.severity === 'error')
}

/** The target a row belongs to, or why it belongs to none. */
export function targetOf(row: DraftRow, around: Surroundings): { target: KnownTarget } | { problem: CellProblem } {
  const written = row.parsed?.targetName ?? null
  const target = written === null ? around.defaultTarget : around.targetsByNameKey.get(nameKey(written))
  const complain = (reason: string, remedy: string) => ({
    problem: { rowNumber: row.rowNumber, column: 'target', value: written, reason, remedy, severity: 'error' as const },
  })
  if (!target && written === null) {
    return complain('The row names no target, and none was chosen for the file.', 'Choose the target of the whole file, or write its name in the column target.')
  }
  if (!target) {
    return complain(`No target here is called ${written}.`, 'Check the spelling, or ask a coordinator to add this target and then choose it under Target: all rows are looked at again.')
  }
  if (target.kind !== around.kind) {
    return complain(`${target.name} takes measures of the kind "${KIND_TEXT[target.kind]}", and this file was read as "${KIND_TEXT[around.kind]}".`, 'Name a target of the same kind, or upload the file as the other kind.')
  }
  return { target }
}

/** By what a row's measure is known to be here already, within its target. */
export function measureKey(row: ParsedRow, around: Pick<Surroundings, 'ownObserverName'>): string {
  return duplicateKey(row, row.observerName ?? around.ownObserverName)
}

/** A row with the target it belongs to and the key of its measure; null where it has none or cannot be read. */
export interface PlacedRow {
  row: DraftRow
  targetId: string | null
  key: string | null
  problems: CellProblem[]
}

/** Finds where a row belongs, before it is known what the target has already. */
export function placeRow(row: DraftRow, around: Surroundings): PlacedRow {
  const found = targetOf(row, around)
  const targetId = 'target' in found ? found.target.id : null
  const problems = 'problem' in found && row.parsed ? [found.problem] : []
  const isReadable = row.parsed && targetId !== null && !hasErrors(row.problems)
  return { row, targetId, key: isReadable ? measureKey(row.parsed!, around) : null, problems }
}

/**
 * Decides on the rows of one batch, to be called for each in order: bad where it cannot be read or has no target, already here
 * where the target has this very measure or an earlier row of the batch brings it, good otherwise.
 */
export function createRowJudge(isKnown: (targetId: string, key: string) => boolean): (placed: PlacedRow) => Resolution {
  const firstRows = new Map<string, number>()
  return ({ row, targetId, key, problems }) => {
    if (targetId === null || key === null) return { state: 'bad', targetId, problems }
    const first = firstRows.get(`${targetId}|${key}`)
    firstRows.set(`${targetId}|${key}`, first ?? row.rowNumber)
    if (isKnown(targetId, key)) return { state: 'already-here', targetId, problems: [note(row, ALREADY_HERE)] }
    if (first !== undefined) return { state: 'already-here', targetId, problems: [note(row, ROW_SENTENCES.duplicateOfRow(first))] }
    return { state: 'good', targetId, problems: [] }
  }
}

const ALREADY_HERE = {
  reason: 'This measure is already here: same observer, target, epoch and value.',
  remedy: 'Nothing needs doing; it will not be doubled.',
}

function note(row: DraftRow, { reason, remedy }: { reason: string; remedy: string }): CellProblem {
  return { rowNumber: row.rowNumber, column: null, value: null, reason, remedy, severity: 'note' }
}
