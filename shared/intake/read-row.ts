import type { Kind } from '../../fitting/types'
import type { CellProblem } from '../schemas/batches'
import type { Delimiter } from './delimiter'
import type { ParsedRow, RowCells } from './parsed-row'
import { RowProblems } from './problems'
import { readEquatorialRow } from './read-equatorial-row'
import { readPlaneRow } from './read-plane-row'
import { readRelativeRow } from './read-relative-row'
import { RowReader } from './row-reader'

export interface RowOptions {
  rowNumber?: number
  /** The present as a year with decimals; given, later epochs are remarked on. */
  now?: number | undefined
  /** How the file separates its columns; a single row that is being mended has none, and may have decimal commas. */
  delimiter?: Delimiter
}

/** Reads one row by its canonical cells: as a file is read, or as a person mends it. */
export function readRow(cells: RowCells, kind: Kind, options: RowOptions = {}): { parsed: ParsedRow | null; problems: CellProblem[] } {
  const { rowNumber = 0, now, delimiter } = options
  const problems = new RowProblems(rowNumber)
  const row = new RowReader(cells, problems, { allowsDecimalComma: delimiter !== 'comma', ...(delimiter ? { delimiter } : {}) })
  return { parsed: READERS[kind](row, now), problems: problems.list }
}

const READERS: Record<Kind, (row: RowReader, nowYr?: number) => ParsedRow | null> = {
  relative: readRelativeRow,
  equatorial: readEquatorialRow,
  plane: readPlaneRow,
}
