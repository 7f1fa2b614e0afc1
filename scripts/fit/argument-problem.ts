import type { CellProblem } from '../../shared/schemas/batches'

/** What is wrong outside the rows, in the shape in which rows complain. */
export function argumentProblem(reason: string, remedy: string): CellProblem {
  return { rowNumber: 0, column: null, value: null, reason, remedy, severity: 'error' }
}
