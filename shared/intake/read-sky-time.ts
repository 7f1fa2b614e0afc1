import { calendarFromJd, isCalendarDate, jdFromCalendar, readIsoTime } from '../../fitting/time'
import type { Complaint } from './problems'
import { complaintAboutTime, julianYearOfUtcJd, millisecondTime } from './read-time'
import type { RowReader } from './row-reader'
import { EPOCH_SENTENCES, SKY_SENTENCES } from './sentences'

export interface SkyTime {
  timeUtc: string
  epochYr: number
}

/** Before 1620 no table says how the rotating Earth stood. */
const FIRST_YEAR = 1620
const LAST_YEAR = 2500
const DAY_WITH_FRACTION = /^(\d{4})[- ](\d{1,2})[- ](\d{1,2})([.,]\d{1,12})$/

/** The middle of an exposure in UTC, to the millisecond; null where it was complained of. */
export function readSkyTime(row: RowReader, nowYr?: number): SkyTime | null {
  const written = row.written('time_utc')
  if (written === '') {
    row.problems.error('time_utc', null, SKY_SENTENCES.timeMissing())
    return null
  }
  const read = julianDateOf(written)
  if (typeof read !== 'number') {
    row.complain('time_utc', read)
    return null
  }
  const { year } = calendarFromJd(read, 'gregorian')
  if (year < FIRST_YEAR || year >= LAST_YEAR) {
    row.complain('time_utc', SKY_SENTENCES.yearRange(FIRST_YEAR, LAST_YEAR))
    return null
  }
  const { iso, jdUtc } = millisecondTime(read)
  const epochYr = julianYearOfUtcJd(jdUtc)
  if (nowYr !== undefined && epochYr > nowYr) row.note('time_utc', EPOCH_SENTENCES.inFuture())
  return { timeUtc: iso, epochYr }
}

/** The Julian date of UTC that a text says, or what is wrong with it. */
function julianDateOf(written: string): number | Complaint {
  const fraction = DAY_WITH_FRACTION.exec(written)
  if (fraction) return dayWithFraction(fraction)
  const read = readIsoTime(written)
  if (read.ok) return read.hasTime ? read.jd : SKY_SENTENCES.timeOfDayMissing()
  return read.problem === 'not-iso' ? SKY_SENTENCES.notATime() : complaintAboutTime(written, read.problem)
}

function dayWithFraction([, year, month, day, fraction]: RegExpExecArray): number | Complaint {
  const date = { year: Number(year), month: Number(month), day: Number(day) }
  const iso = `${year}-${month!.padStart(2, '0')}-${day!.padStart(2, '0')}`
  if (!isCalendarDate(date, 'gregorian')) return complaintAboutTime(iso, 'no-such-date')
  return jdFromCalendar(date, 'gregorian') + Number(fraction!.replace(',', '.'))
}
