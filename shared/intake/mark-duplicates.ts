import type { Steps } from '../turns/turns'
import { duplicateKey } from './duplicate-key'
import { nameKey } from './name-key'
import { RowProblems } from './problems'
import type { MeasureRow } from './read-measures'
import { ROW_SENTENCES } from './sentences'

/** Marks rows that repeat a measure of the same target and observer further up in the file. */
export function* markDuplicates(rows: readonly MeasureRow[]): Steps<MeasureRow[]> {
  const firstRowByKey = new Map<string, number>()
  const marked: MeasureRow[] = []
  for (const row of rows) {
    marked.push(markDuplicate(row, firstRowByKey))
    yield
  }
  return marked
}

function markDuplicate(row: MeasureRow, firstRowByKey: Map<string, number>): MeasureRow {
  if (!row.parsed) return row
  const components = row.parsed.kind === 'relative' ? row.parsed.components : null
  const key = [row.parsed.targetName ?? '', components ?? ''].map(nameKey).join('|') + duplicateKey(row.parsed, row.parsed.observerName ?? '')
  const first = firstRowByKey.get(key)
  if (first === undefined) {
    firstRowByKey.set(key, row.rowNumber)
    return row
  }
  const problems = new RowProblems(row.rowNumber)
  problems.note(null, null, ROW_SENTENCES.duplicateOfRow(first))
  return { ...row, duplicateOfRow: first, problems: [...row.problems, ...problems.list] }
}
