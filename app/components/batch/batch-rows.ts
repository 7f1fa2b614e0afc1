import type { BatchRowView, BatchView, CellProblem } from '#shared/schemas/batches'

export const ROW_FILTERS = ['bad', 'note', 'good', 'already-here', 'sent', 'all'] as const
export type RowFilter = (typeof ROW_FILTERS)[number]

/** The problems of a row that are worth telling beside it: of one that is already here its state says all. */
export function toldProblems(row: BatchRowView): CellProblem[] {
  return row.state === 'already-here' ? [] : row.problems
}

const hasNote = (row: BatchRowView) => toldProblems(row).some(problem => problem.severity === 'note')

/** Whether a row belongs to what is being looked at. */
export function rowMatches(row: BatchRowView, filter: RowFilter): boolean {
  if (filter === 'all') return true
  if (filter === 'note') return hasNote(row)
  return row.state === filter
}

const FILTER_TEXT: Record<RowFilter, string> = { 'bad': 'to mend', 'note': 'to look at', 'good': 'ready', 'already-here': 'already here', 'sent': 'sent', 'all': 'all' }

/** The filters that match something, with their counts; "all" always stands last. */
export function filterChoices(rows: readonly BatchRowView[]): { filter: RowFilter, text: string, count: number }[] {
  return ROW_FILTERS
    .map(filter => ({ filter, text: FILTER_TEXT[filter], count: rows.filter(row => rowMatches(row, filter)).length }))
    .filter(choice => choice.count > 0 || choice.filter === 'all')
}

/** Columns to show: those of the file that are used, then those that some problem asks for. */
export function shownColumns(batch: Pick<BatchView, 'reading' | 'items'>): string[] {
  const asked = batch.items.flatMap(row => row.problems.flatMap(problem => problem.column ?? []))
  return [...new Set([...batch.reading.columns, ...asked])]
}

/** The first problem of a cell, an error before a note; undefined where there is none. */
export function cellProblem(row: BatchRowView, column: string): CellProblem | undefined {
  const problems = row.problems.filter(problem => problem.column === column)
  return problems.find(problem => problem.severity === 'error') ?? problems[0]
}

/** What the remedy proposes to write ("Did you mean 0.940?"), or null where it proposes nothing. */
export function suggestionOf(problem: CellProblem): string | null {
  return /Did you mean (\S+)\?/.exec(problem.remedy)?.[1] ?? null
}

/** The cells that differ from what the row has now; empty where nothing was typed. */
export function changedCells(row: BatchRowView, typed: Readonly<Record<string, string>>): Record<string, string> {
  return Object.fromEntries(Object.entries(typed).filter(([column, text]) => text !== (row.cells[column] ?? '')))
}

/** What is said when a row comes back from mending. */
export function mendSentence(row: BatchRowView | undefined): string {
  if (!row) return ''
  if (row.state === 'bad') {
    const problem = row.problems.find(candidate => candidate.severity === 'error')
    return `Row ${row.rowNumber} still has something to mend${problem ? `: ${problem.reason}. ${problem.remedy}` : '.'}`
  }
  return row.state === 'already-here' ? `Row ${row.rowNumber} is read now; the same measure is already here.` : `Row ${row.rowNumber} is good now.`
}

/** Problems that say the same, gathered: "row 16, 18 and 3 more". */
export interface ProblemGroup {
  key: string
  severity: CellProblem['severity']
  column: string | null
  reason: string
  remedy: string
  rowNumbers: number[]
}

export function groupProblems(rows: readonly BatchRowView[]): ProblemGroup[] {
  const groups = new Map<string, ProblemGroup>()
  for (const problem of rows.flatMap(toldProblems)) {
    const key = [problem.severity, problem.column, problem.reason, problem.remedy].join('\u0000')
    const group = groups.get(key) ?? { key, severity: problem.severity, column: problem.column, reason: problem.reason, remedy: problem.remedy, rowNumbers: [] }
    group.rowNumbers.push(problem.rowNumber)
    groups.set(key, group)
  }
  return [...groups.values()].sort((a, b) => a.severity.localeCompare(b.severity) || a.rowNumbers[0]! - b.rowNumbers[0]!)
}

const NAMED_ROWS = 4

/** "row 16", "rows 16 and 18", "rows 1, 2, 3, 4 and 12 more". */
export function rowsText(rowNumbers: readonly number[]): string {
  if (rowNumbers.length === 1) return `row ${rowNumbers[0]}`
  const named = rowNumbers.slice(0, NAMED_ROWS)
  const more = rowNumbers.length - named.length
  const last = more > 0 ? `${more} more` : String(named.pop())
  return `rows ${named.join(', ')} and ${last}`
}
