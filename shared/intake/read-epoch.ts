import { jdFromMjd, julianEpochFromWritten } from '../../fitting/time'
import { EPOCH_COLUMNS, type EpochColumn } from './columns'
import type { Complaint } from './problems'
import { julianYearOfUtcJd, readTime } from './read-time'
import type { RowReader } from './row-reader'
import { EPOCH_SENTENCES } from './sentences'

export const FIRST_YEAR = 1600
export const LAST_YEAR = 2500
const SMALLEST_JD = 1_000_000

/** The time of a `relative` measure as a Julian year, from the one column that gives it; null where it was complained of. */
export function readEpoch(row: RowReader, nowYr?: number): number | null {
  const filled = EPOCH_COLUMNS.filter(column => row.isFilled(column))
  const [column] = filled
  if (!column) {
    row.problems.error(null, null, EPOCH_SENTENCES.missing())
    return null
  }
  if (filled.length > 1) {
    row.complain(filled[1]!, EPOCH_SENTENCES.twice(filled.join(' and ')))
    return null
  }
  const epochYr = READERS[column](row)
  if (epochYr !== null && nowYr !== undefined && epochYr > nowYr) row.note(column, EPOCH_SENTENCES.inFuture())
  return epochYr
}

const READERS: Record<EpochColumn, (row: RowReader) => number | null> = {
  epoch: readYear,
  jd: row => readDayCount(row, 'jd'),
  mjd: row => readDayCount(row, 'mjd'),
  date: readDate,
}

function isYear(value: number): boolean {
  return value >= FIRST_YEAR && value <= LAST_YEAR
}

function readYear(row: RowReader): number | null {
  const written = row.written('epoch')
  if (/^\d{4}-\d/.test(written) || /^\d{1,2}[./]\d{1,2}[./]\d{4}$/.test(written)) return refuse(row, 'epoch', EPOCH_SENTENCES.maybeDate())
  const prefix = /^[BJ](?=\s*\d)/i.exec(written)?.[0].toUpperCase() as 'B' | 'J' | undefined
  const year = row.number('epoch', yearRule, prefix ? written.slice(1) : written)
  return year === null ? null : julianEpochFromWritten(year, prefix)
}

function yearRule(value: number): Complaint | null {
  if (isYear(value)) return null
  if (value >= SMALLEST_JD) return EPOCH_SENTENCES.maybeJd()
  return value >= 10_000 ? EPOCH_SENTENCES.maybeMjd() : EPOCH_SENTENCES.yearRange()
}

function readDayCount(row: RowReader, column: 'jd' | 'mjd'): number | null {
  const toJd = (value: number) => (column === 'jd' ? value : jdFromMjd(value))
  const days = row.number(column, (value) => {
    if (isYear(value)) return EPOCH_SENTENCES.yearInDayColumn()
    if (isYear(julianYearOfUtcJd(toJd(value)))) return null
    return column === 'jd' ? EPOCH_SENTENCES.jdRange() : EPOCH_SENTENCES.mjdRange()
  })
  return days === null ? null : julianYearOfUtcJd(toJd(days))
}

function readDate(row: RowReader): number | null {
  const read = readTime(row.written('date'))
  if (!read.ok) return refuse(row, 'date', read.complaint)
  const { epochYr } = read.time
  return isYear(epochYr) ? epochYr : refuse(row, 'date', EPOCH_SENTENCES.yearRange())
}

function refuse(row: RowReader, column: EpochColumn, complaint: Complaint): null {
  row.complain(column, complaint)
  return null
}
