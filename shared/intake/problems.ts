import type { CellProblem } from '../schemas/batches'

/** Why something cannot be used as it stands, and what would help. */
export interface Complaint {
  reason: string
  remedy: string
}

/** A problem of the whole file. */
export function fileProblem({ reason, remedy }: Complaint, place: Partial<Pick<CellProblem, 'rowNumber' | 'column' | 'value'>> = {}): CellProblem {
  return { rowNumber: place.rowNumber ?? 0, column: place.column ?? null, value: place.value ?? null, reason, remedy, severity: 'error' }
}

export function asNote(problem: CellProblem): CellProblem {
  return { ...problem, severity: 'note' }
}

/** Long cells are shown by their beginning. */
const SHOWN_LENGTH = 80

export function shown(text: string): string {
  return text.length > SHOWN_LENGTH ? `${text.slice(0, SHOWN_LENGTH)}…` : text
}

/** Collects what is wrong with one row, cell by cell. */
export class RowProblems {
  readonly list: CellProblem[] = []

  constructor(readonly rowNumber: number) {}

  error(column: string | null, value: string | null, complaint: Complaint): void {
    this.add(column, value, complaint, 'error')
  }

  note(column: string | null, value: string | null, complaint: Complaint): void {
    this.add(column, value, complaint, 'note')
  }

  get hasErrors(): boolean {
    return this.list.some(problem => problem.severity === 'error')
  }

  private add(column: string | null, value: string | null, { reason, remedy }: Complaint, severity: CellProblem['severity']): void {
    this.list.push({ rowNumber: this.rowNumber, column, value: value === null ? null : shown(value), reason, remedy, severity })
  }
}
