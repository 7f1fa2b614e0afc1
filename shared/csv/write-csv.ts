import Papa from 'papaparse'

/** One column of a table that is written out: its heading and the cell of a row. */
export interface CsvColumn<Row> {
  name: string
  /** Numbers are written in the fewest digits that read back to the same value; null and undefined leave the cell empty. */
  cell: (row: Row) => number | string | null | undefined
}

/**
 * Writes a table as CSV (RFC 4180: commas, CRLF, a heading row).
 * @param columns in the order in which they are written.
 * @param rows one record each.
 * @returns the text, ending in a line break.
 * @throws RangeError on a number that is not finite, which CSV has no agreed way to say.
 */
export function writeCsv<Row>(columns: readonly CsvColumn<Row>[], rows: readonly Row[]): string {
  const cells = rows.map(row => columns.map(column => cellText(column.cell(row), column.name)))
  return Papa.unparse({ fields: columns.map(column => column.name), data: cells }, { newline: '\r\n' }) + '\r\n'
}

function cellText(cell: number | string | null | undefined, columnName: string): string {
  if (cell === null || cell === undefined) return ''
  if (typeof cell === 'string') return withoutFormula(cell)
  if (!Number.isFinite(cell)) throw new RangeError(`column ${columnName} holds ${cell}, which cannot be written as CSV`)
  return Object.is(cell, -0) ? '-0' : String(cell)
}

/** A spreadsheet takes text that begins so for a formula; an apostrophe in front makes it text again. Numbers never pass here. */
function withoutFormula(text: string): string {
  return /^[=+\-@\t\r\n]/.test(text) ? `'${text}` : text
}
