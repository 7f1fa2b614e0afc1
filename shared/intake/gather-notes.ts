import type { CellProblem } from '../schemas/batches'
import { asNote, fileProblem } from './problems'
import type { MeasureRow } from './read-measures'
import { FILE_SENTENCES } from './sentences'

/** Up to so many rows each keep their own note. */
const FEW_ROWS = 5

/** A note that most rows share is one of the file: said once, it does not hide the notes that concern single rows. */
export function gatherNotes(rows: MeasureRow[]): { rows: MeasureRow[], fileNotes: CellProblem[] } {
  const notesByKey = new Map<string, CellProblem[]>()
  for (const note of rows.flatMap(row => row.problems.filter(problem => problem.severity === 'note'))) {
    const alike = notesByKey.get(keyOf(note))
    if (alike) alike.push(note)
    else notesByKey.set(keyOf(note), [note])
  }
  const shared = [...notesByKey].filter(([, notes]) => notes.length > FEW_ROWS && notes.length * 2 > rows.length)
  if (shared.length === 0) return { rows, fileNotes: [] }
  const keys = new Set(shared.map(([key]) => key))
  return {
    rows: rows.map(row => ({ ...row, problems: row.problems.filter(problem => problem.severity !== 'note' || !keys.has(keyOf(problem))) })),
    fileNotes: shared.map(([, [first, ...others]]) => asNote(fileProblem(FILE_SENTENCES.inManyRows(first!, others.length + 1), { rowNumber: first!.rowNumber, column: first!.column }))),
  }
}

function keyOf({ column, reason }: CellProblem): string {
  return `${column ?? ''}|${reason}`
}
