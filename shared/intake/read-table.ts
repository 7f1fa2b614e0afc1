import Papa from 'papaparse'
import { COLUMNS, canonicalHeading } from './columns'
import { DELIMITERS, findDelimiter, type Delimiter } from './delimiter'
import type { CellProblem } from '../schemas/batches'
import { fileProblem } from './problems'
import { FILE_SENTENCES } from './sentences'

export interface TableRecord {
  /** Counted as a spreadsheet counts: the first row of the file is 1, empty rows count. */
  rowNumber: number
  cells: string[]
}

export interface Table {
  delimiter: Delimiter
  /** Row number of the column names. */
  headerRow: number
  headings: string[]
  records: TableRecord[]
}

const KNOWN_NAMES: ReadonlySet<string> = new Set([...COLUMNS.relative, ...COLUMNS.plane].map(column => column.name))

/** Splits a text into column names and rows. Rows without any text are left out; lines that begin with # above the names too. */
export function readTable(text: string): { ok: true; table: Table } | { ok: false; problem: CellProblem } {
  const lines = text.replace(/\r\n?/g, '\n').split('\n')
  const headerIndex = lines.findIndex(isContent)
  const headerLine = lines[headerIndex]
  if (headerLine === undefined) return { ok: false, problem: fileProblem(FILE_SENTENCES.empty()) }
  const found = findDelimiter(headerLine, KNOWN_NAMES)
  if (!found.ok) return { ok: false, problem: fileProblem(found.complaint) }

  const headerRow = headerIndex + 1
  const { data, errors } = Papa.parse<string[]>(lines.slice(headerIndex).join('\n'), { delimiter: DELIMITERS[found.delimiter], newline: '\n' })
  const quoteError = errors.find(error => error.type === 'Quotes')
  if (quoteError) {
    const rowNumber = (quoteError.row ?? 0) + headerRow
    return { ok: false, problem: fileProblem(FILE_SENTENCES.quoteProblem(rowNumber), { rowNumber }) }
  }
  const [names = [], ...rows] = data
  const headings = names.slice(0, filledLength(names)).map(cell => cell.trim())
  const records = rows
    .map((cells, i) => ({ rowNumber: headerRow + 1 + i, cells }))
    .filter(({ cells }) => cells.some(cell => cell.trim() !== ''))
  return { ok: true, table: { delimiter: found.delimiter, headerRow, headings, records } }
}

function isContent(line: string): boolean {
  return line.trim() !== '' && !line.trimStart().startsWith('#')
}

/** How many cells a row has up to the last one with text. */
export function filledLength(cells: readonly string[]): number {
  let length = cells.length
  while (length > 0 && cells[length - 1]!.trim() === '') length--
  return length
}

/** True where a row of names is no row of names but the first row of measures. */
export function holdsNumbers(headings: readonly string[]): boolean {
  const numeric = headings.filter(heading => /^[+\-−]?[\d.,]+$/.test(heading)).length
  return numeric * 2 >= headings.length && !headings.some(heading => KNOWN_NAMES.has(canonicalHeading(heading)))
}
