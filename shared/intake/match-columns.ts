import { KINDS, type Kind } from '../../fitting/types'
import type { CellProblem } from '../schemas/batches'
import { KIND_TEXT } from '../units/kind-text'
import { canonicalHeading, COLUMNS, EPOCH_COLUMNS, type MeasureColumn } from './columns'
import { nearestName } from './nearest-name'
import { asNote, fileProblem, type Complaint } from './problems'
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

interface Needed {
  what: string
  anyOf: readonly MeasureColumn[]
}

/** What every file of a kind must have a column of, in words. */
const NEEDED: Record<Kind, Needed[]> = {
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
  const missing = missingFor(kind, found.map(({ name }) => name))
  const notes = unused.map(({ heading, name }) => unusedNote({ heading, name, kind, rowNumber: table.headerRow, free: names.filter(column => !used.some(other => other.name === column)) }))
  const errors = [
    ...twice.map(name => fileProblem(FILE_SENTENCES.duplicateHeading(name), { ...inHeader, column: name })),
    ...missingErrors({ missing, kind, names: found.map(({ name }) => name), headings: table.headings }).map(sentence => fileProblem(sentence, inHeader)),
  ]
  return { used, columns: used.map(({ name }) => name), unusedColumns: unused.map(({ heading }) => heading), errors, notes }
}

function missingFor(kind: Kind, names: readonly string[]): Needed[] {
  return NEEDED[kind].filter(({ anyOf }) => !anyOf.some(name => names.includes(name)))
}

/** A file that has all that another kind needs was sent as the wrong kind; else every missing column is named. */
function missingErrors({ missing, kind, names, headings }: { missing: Needed[], kind: Kind, names: string[], headings: readonly string[] }): Complaint[] {
  const other = missing.length === 0 ? undefined : KINDS.find(candidate => candidate !== kind && missingFor(candidate, names).length === 0)
  if (other) return [FILE_SENTENCES.fileOfOtherKind(KIND_TEXT[other], KIND_TEXT[kind])]
  return missing.map(({ what }) => FILE_SENTENCES.columnMissing(what, list(headings)))
}

/** The same thing under the name that it has in another kind. */
const TWINS: Partial<Record<Kind, Record<string, MeasureColumn>>> = {
  relative: { time_utc: 'date' },
  plane: { date: 'time_utc' },
  equatorial: { date: 'time_utc' },
}

interface UnusedColumn {
  heading: string
  name: string
  kind: Kind
  rowNumber: number
  /** Canonical names that the file does not have yet. */
  free: MeasureColumn[]
}

function unusedNote({ heading, rowNumber, ...column }: UnusedColumn): CellProblem {
  return asNote(fileProblem(unusedSentence(column), { rowNumber, column: heading.slice(0, 60), value: heading.slice(0, 80) }))
}

function unusedSentence({ name, kind, free }: Pick<UnusedColumn, 'name' | 'kind' | 'free'>): Complaint {
  const twin = TWINS[kind]?.[name]
  if (twin && free.includes(twin)) return FILE_SENTENCES.columnNotUsed(twin)
  const other = KINDS.find(candidate => candidate !== kind && COLUMNS[candidate].some(column => column.name === name))
  return other ? FILE_SENTENCES.columnOfOtherKind(KIND_TEXT[other]) : FILE_SENTENCES.columnNotUsed(nearestName(name, free))
}

const SHOWN_HEADINGS = 12

function list(headings: readonly string[]): string {
  const some = headings.slice(0, SHOWN_HEADINGS).map(heading => heading.slice(0, 40) || '(no name)').join(', ')
  return headings.length > SHOWN_HEADINGS ? `${some} and ${headings.length - SHOWN_HEADINGS} more` : some
}
