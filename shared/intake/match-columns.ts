import { KINDS, type Kind } from '../../fitting/types'
import type { CellProblem } from '../schemas/batches'
import { canonicalHeading, COLUMNS, EPOCH_COLUMNS, type MeasureColumn } from './columns'
import { nearestName } from './nearest-name'
import { asNote, fileProblem } from './problems'
import { holdsNumbers, type Table } from './read-table'
import { FILE_SENTENCES } from './sentences'

export interface MatchedColumns {
  used: { name: MeasureColumn; index: number }[]
  columns: string[]
  /** Headings as they stand in the file. */
  unusedColumns: string[]
  errors: CellProblem[]
  notes: CellProblem[]
}

/** Wider tables are something else than measures. */
const MOST_COLUMNS = 500

/** What every file of a kind must have a column of, in words. */
const NEEDED: Record<Kind, { what: string; anyOf: readonly MeasureColumn[] }[]> = {
  relative: [
    { what: 'when it was measured (epoch, jd, mjd or date)', anyOf: EPOCH_COLUMNS },
    { what: 'what was measured (theta_deg and rho_arcsec, east_arcsec and north_arcsec, or rho_limit_arcsec)', anyOf: ['theta_deg', 'rho_arcsec', 'east_arcsec', 'north_arcsec', 'rho_limit_arcsec'] },
  ],
  equatorial: [
    { what: 'when it was measured (time_utc)', anyOf: ['time_utc'] },
    { what: 'the right ascension (ra_deg or ra_hms)', anyOf: ['ra_deg', 'ra_hms'] },
    { what: 'the declination (dec_deg or dec_dms)', anyOf: ['dec_deg', 'dec_dms'] },
    { what: 'where it was measured (station, or lon_deg, lat_deg and height_m)', anyOf: ['station', 'lon_deg', 'lat_deg', 'height_m'] },
  ],
  plane: [
    { what: 'the direction (phi_deg)', anyOf: ['phi_deg'] },
    { what: 'the distance (r or diameter_arcmin)', anyOf: ['r', 'diameter_arcmin'] },
  ],
}

/** Finds the canonical columns among a file's headings, and says which are missing, twice there or not used. */
export function matchColumns(table: Table, kind: Kind): MatchedColumns {
  const inHeader = { rowNumber: table.headerRow }
  const nothing: MatchedColumns = { used: [], columns: [], unusedColumns: [], errors: [], notes: [] }
  if (table.headings.length > MOST_COLUMNS) return { ...nothing, errors: [fileProblem(FILE_SENTENCES.tooManyColumns(table.headings.length, MOST_COLUMNS), inHeader)] }
  if (holdsNumbers(table.headings)) return { ...nothing, errors: [fileProblem(FILE_SENTENCES.headerMissing(), inHeader)] }

  const names = COLUMNS[kind].map(column => column.name)
  const isName = (name: string): name is MeasureColumn => (names as string[]).includes(name)
  const found = table.headings.map((heading, index) => ({ heading, name: canonicalHeading(heading), index }))
  const used = found.flatMap(({ name, index }) => (isName(name) ? [{ name, index }] : []))
  const unused = found.filter(({ heading, name }) => heading !== '' && !isName(name))
  const twice = [...new Set(used.filter(({ name, index }) => used.some(other => other.name === name && other.index < index)).map(({ name }) => name))]
  const missing = NEEDED[kind].filter(({ anyOf }) => !used.some(({ name }) => anyOf.includes(name)))
  const notes = unused.map(({ heading, name }) => unusedNote({ heading, name, kind, rowNumber: table.headerRow, free: names.filter(column => !used.some(other => other.name === column)) }))
  const errors = [
    ...twice.map(name => fileProblem(FILE_SENTENCES.duplicateHeading(name), { ...inHeader, column: name })),
    ...missing.map(({ what }) => fileProblem(FILE_SENTENCES.columnMissing(what, list(table.headings)), inHeader)),
  ]
  return { used, columns: used.map(({ name }) => name), unusedColumns: unused.map(({ heading }) => heading), errors, notes }
}

interface UnusedColumn {
  heading: string
  name: string
  kind: Kind
  rowNumber: number
  /** Canonical names that the file does not have yet. */
  free: MeasureColumn[]
}

function unusedNote({ heading, name, kind, rowNumber, free }: UnusedColumn): CellProblem {
  const other = KINDS.find(candidate => candidate !== kind && COLUMNS[candidate].some(column => column.name === name))
  const sentence = other ? FILE_SENTENCES.columnOfOtherKind(other) : FILE_SENTENCES.columnNotUsed(nearestName(name, free))
  return asNote(fileProblem(sentence, { rowNumber, column: heading.slice(0, 60), value: heading.slice(0, 80) }))
}

const SHOWN_HEADINGS = 12

function list(headings: readonly string[]): string {
  const some = headings.slice(0, SHOWN_HEADINGS).map(heading => heading.slice(0, 40) || '(no name)').join(', ')
  return headings.length > SHOWN_HEADINGS ? `${some} and ${headings.length - SHOWN_HEADINGS} more` : some
}
