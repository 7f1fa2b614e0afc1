import type { Kind } from '../../fitting/types'
import { UPLOAD_CAP_ROWS, type CellProblem } from '../schemas/batches'
import { runAtOnce, type Steps } from '../turns/turns'
import { decodeText } from './decode-text'
import { delimiterWord, delimitersIn, type Delimiter } from './delimiter'
import { gatherNotes } from './gather-notes'
import { markDuplicates } from './mark-duplicates'
import { matchColumns, type MatchedColumns } from './match-columns'
import type { ParsedRow, RowCells } from './parsed-row'
import { fileProblem, RowProblems } from './problems'
import { readRow } from './read-row'
import { filledLength, readTable, type Table, type TableRecord } from './read-table'
import { FILE_SENTENCES, ROW_SENTENCES } from './sentences'

export interface ReadOptions {
  kind: Kind
  /** The present as a year with decimals; given, later epochs are remarked on. */
  now?: number
}

export interface Reading {
  encoding: string
  delimiter: string
  columns: string[]
  unusedColumns: string[]
  headerRow: number
}

export interface MeasureRow {
  rowNumber: number
  /** Original text by canonical column name. */
  cells: RowCells
  /** Null exactly where a problem of severity 'error' stands with the row. */
  parsed: ParsedRow | null
  problems: CellProblem[]
  /** The row above that holds the same measure, target and observer; this one counts for nothing. */
  duplicateOfRow: number | null
}

export interface MeasureReading {
  reading: Reading
  /** An error here means that the file cannot be read as measures: there are no rows then. */
  fileProblems: CellProblem[]
  rows: MeasureRow[]
}

/** Reads a file of measures, as bytes or as pasted text, into rows with everything that is wrong with them. Never throws for what stands in the file. */
export function readMeasures(input: Uint8Array | string, options: ReadOptions): MeasureReading {
  return runAtOnce(readMeasuresInSteps(input, options))
}

/** The same in steps of a few milliseconds, for a server that has others to answer meanwhile. */
export function* readMeasuresInSteps(input: Uint8Array | string, options: ReadOptions): Steps<MeasureReading> {
  const reading: Reading = { encoding: '', delimiter: '', columns: [], unusedColumns: [], headerRow: 0 }
  const refuse = (...fileProblems: CellProblem[]): MeasureReading => ({ reading, fileProblems, rows: [] })
  const { kind } = options

  const decoded = decodeText(typeof input === 'string' ? new TextEncoder().encode(input) : input)
  if (!decoded.ok) return refuse(decoded.problem)
  reading.encoding = decoded.encoding
  const notes = decoded.note ? [decoded.note] : []

  yield
  const read = yield* readTable(decoded.text)
  if (!read.ok) return refuse(read.problem, ...notes)
  const { table } = read
  const matched = matchColumns(table, kind)
  Object.assign(reading, { delimiter: table.delimiter, headerRow: table.headerRow, columns: matched.columns, unusedColumns: matched.unusedColumns })
  const errors = [...matched.errors, ...amountErrors(table)]
  if (errors.length > 0) return refuse(...errors, ...matched.notes, ...notes)

  const rows: MeasureRow[] = []
  for (const record of table.records) {
    rows.push(readRecord(record, { table, matched, kind, now: options.now }))
    yield
  }
  const gathered = gatherNotes(yield* markDuplicates(rows))
  return { reading, fileProblems: [...notes, ...matched.notes, ...gathered.fileNotes], rows: gathered.rows }
}

function amountErrors(table: Table): CellProblem[] {
  if (table.records.length === 0) return [fileProblem(FILE_SENTENCES.headerOnly(), { rowNumber: table.headerRow })]
  if (table.records.length > UPLOAD_CAP_ROWS) return [fileProblem(FILE_SENTENCES.tooManyRows(table.records.length, UPLOAD_CAP_ROWS))]
  const misseparated = table.records.map(record => otherDelimiter(record, table.delimiter)).filter(other => other !== null)
  if (misseparated.length < table.records.length) return []
  const found = `${delimiterWord(table.delimiter)} in the first row, ${delimiterWord(misseparated[0]!)} below it`
  return [fileProblem(FILE_SENTENCES.mixedDelimiters(found))]
}

/** The separator of a row that was not split because it is separated otherwise than the first row. */
function otherDelimiter(record: TableRecord, delimiter: Delimiter): Delimiter | null {
  const [only = ''] = record.cells
  return record.cells.length === 1 ? delimitersIn(only).find(found => found !== delimiter) ?? null : null
}

interface Surroundings {
  table: Table
  matched: MatchedColumns
  kind: Kind
  now: number | undefined
}

function readRecord(record: TableRecord, { table, matched, kind, now }: Surroundings): MeasureRow {
  const { rowNumber } = record
  const cells: RowCells = {}
  for (const { name, index } of matched.used) cells[name] = record.cells[index] ?? ''
  const other = otherDelimiter(record, table.delimiter)
  const shape = shapeProblems(record, { headings: table.headings.length, other, delimiter: table.delimiter })
  if (shape.hasErrors) return { rowNumber, cells, parsed: null, problems: shape.list, duplicateOfRow: null }
  const { parsed, problems } = readRow(cells, kind, { rowNumber, now, delimiter: table.delimiter })
  return { rowNumber, cells, parsed, problems: [...shape.list, ...problems], duplicateOfRow: null }
}

function shapeProblems(record: TableRecord, expected: { headings: number; other: Delimiter | null; delimiter: Delimiter }): RowProblems {
  const problems = new RowProblems(record.rowNumber)
  const filled = filledLength(record.cells)
  if (expected.other) problems.error(null, record.cells[0] ?? '', ROW_SENTENCES.otherDelimiter(delimiterWord(expected.other), delimiterWord(expected.delimiter)))
  else if (filled > expected.headings) problems.error(null, record.cells[expected.headings] ?? '', ROW_SENTENCES.tooManyCells(record.cells.length, expected.headings))
  else if (record.cells.length < expected.headings) problems.note(null, null, ROW_SENTENCES.tooFewCells(record.cells.length, expected.headings))
  return problems
}
