import Papa from 'papaparse'
import type { Steps } from '../turns/turns'
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

const KNOWN_NAMES: ReadonlySet<string> = new Set(Object.values(COLUMNS).flat().map(column => column.name))

export type ReadTable = { ok: true; table: Table } | { ok: false; problem: CellProblem }

/** Splits a text into column names and rows. Rows without any text are left out; lines that begin with # above the names too. */
export function* readTable(anyText: string): Steps<ReadTable> {
  const text = anyText.replace(/\r\n?/g, '\n')
  const header = findHeader(text)
  if (!header) return { ok: false, problem: fileProblem(FILE_SENTENCES.empty()) }
  const { row: headerRow, start } = header
  const found = findDelimiter(header.line, KNOWN_NAMES)
  if (!found.ok) return { ok: false, problem: fileProblem(found.complaint) }

  const split = yield* splitRows(text.slice(start), DELIMITERS[found.delimiter])
  if (!split.ok) {
    const rowNumber = split.row + headerRow
    return { ok: false, problem: fileProblem(FILE_SENTENCES.quoteProblem(rowNumber), { rowNumber }) }
  }
  const [names = [], ...rows] = split.rows
  const headings = names.slice(0, filledLength(names)).map(cell => cell.trim())
  const records = rows
    .map((cells, i) => ({ rowNumber: headerRow + 1 + i, cells }))
    .filter(({ cells }) => cells.some(cell => cell.trim() !== ''))
  return { ok: true, table: { delimiter: found.delimiter, headerRow, headings, records } }
}

/** The first line with content: its row number, its text and where it begins. */
function findHeader(text: string): { row: number; line: string; start: number } | null {
  for (let row = 1, start = 0; start < text.length; row++) {
    const end = lineEnd(text, start)
    const line = text.slice(start, end)
    if (isContent(line)) return { row, line, start }
    start = end + 1
  }
  return null
}

function lineEnd(text: string, from: number): number {
  const lineFeed = text.indexOf('\n', from)
  return lineFeed === -1 ? text.length : lineFeed
}

/** A text of any size is split in short steps, in pieces of about this length. */
const PIECE_CHARACTERS = 65_536

/**
 * All rows as cells, or the first row, counted from 0, whose quotation marks cannot be right. A piece ends behind a line feed, so
 * that no closing mark is cut off from what follows it; a row that goes on, as one with a line feed between quotation marks, is
 * read again with the next piece, which is then at least as long as what is left over.
 */
export function* splitRows(text: string, delimiter: string, pieceCharacters = PIECE_CHARACTERS): Steps<{ ok: true; rows: string[][] } | { ok: false; row: number }> {
  const rows: string[][] = []
  let start = 0
  let end = 0
  for (;;) {
    end = lineEnd(text, end + Math.max(pieceCharacters, end - start)) + 1
    const isLast = end >= text.length
    const { data, errors, meta } = new Papa.Parser({ delimiter, newline: '\n' }).parse(text.slice(start, end), 0, !isLast) as Papa.ParseResult<string[]>
    const quoteError = errors.find(error => error.type === 'Quotes')
    if (quoteError) return { ok: false, row: rows.length + (quoteError.row ?? 0) }
    for (const row of data) rows.push(row)
    if (isLast) return { ok: true, rows }
    start += meta.cursor
    yield
  }
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
