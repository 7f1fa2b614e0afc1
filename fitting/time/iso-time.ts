/**
 * ISO 8601 dates and times: 2016-08-29, 2016-08-29T12:32, 2016-08-29T12:32:34.5Z, 2016-08-29T12:32:34+02:00. A blank may stand for T.
 * The calendar is Gregorian throughout, as the standard says. A date alone means its beginning, 0h.
 *
 * Source: ISO 8601:2004, 4.1 to 4.3.
 */
import { calendarFromJd, isCalendarDate, jdFromCalendar } from './calendar'

export const ISO_TIME_PROBLEMS = ['not-iso', 'no-such-date', 'no-such-time'] as const
export type IsoTimeProblem = (typeof ISO_TIME_PROBLEMS)[number]

/** A time as read. */
export type IsoTime
  = | { ok: true, jd: number, hasTime: boolean, hasZone: boolean }
    | { ok: false, problem: IsoTimeProblem }

const PATTERN = /^(\d{4})-(\d{2})-(\d{2})(?:[T ](\d{2}):(\d{2})(?::(\d{2}(?:\.\d{1,12})?))?\s?(Z|[+-]\d{2}:?\d{2})?)?$/i
const SECONDS_PER_DAY = 86400

/**
 * Reads an ISO 8601 date or time.
 * @param text the text, blanks around it ignored.
 * @returns the Julian date (of UTC where a zone is given, else of the scale it was written in), whether a time and a zone were there; or
 * what is wrong. Second 60 is read as the leap second, the beginning of the next minute.
 * Source: ISO 8601:2004, 4.1 to 4.3.
 */
export function readIsoTime(text: string): IsoTime {
  const match = PATTERN.exec(text.trim())
  if (!match) return { ok: false, problem: 'not-iso' }
  const [, year, month, day, hour, minute, second, zone] = match
  const date = { year: Number(year), month: Number(month), day: Number(day) }
  if (!isCalendarDate(date, 'gregorian')) return { ok: false, problem: 'no-such-date' }
  const seconds = secondsOfDay(Number(hour ?? 0), Number(minute ?? 0), Number(second ?? 0))
  const offset = zoneSeconds(zone)
  if (!(seconds >= 0) || !(Math.abs(offset) <= SECONDS_PER_DAY)) return { ok: false, problem: 'no-such-time' }
  const jd = jdFromCalendar(date, 'gregorian') + (seconds - offset) / SECONDS_PER_DAY
  return { ok: true, jd, hasTime: hour !== undefined, hasZone: zone !== undefined }
}

/** Seconds since 0h; NaN where there is no such time. 24:00 is the end of the day. */
function secondsOfDay(hour: number, minute: number, second: number): number {
  const isEndOfDay = hour === 24 && minute === 0 && second === 0
  const isLeapSecond = minute === 59 && second >= 60 && second < 61
  if ((hour > 23 && !isEndOfDay) || minute > 59 || (second >= 60 && !isLeapSecond)) return NaN
  return hour * 3600 + minute * 60 + second
}

/** Seconds east of Greenwich; NaN where there is no such zone. */
function zoneSeconds(zone: string | undefined): number {
  if (!zone || zone === 'Z' || zone === 'z') return 0
  const hours = Number(zone.slice(1, 3))
  const minutes = Number(zone.slice(-2))
  if (hours > 14 || minutes > 59) return NaN
  return (zone.startsWith('-') ? -1 : 1) * (hours * 3600 + minutes * 60)
}

/**
 * The day of a Julian date in ISO 8601.
 * @param jd JD, d, of the years 0 to 9999.
 * @returns yyyy-mm-dd in the Gregorian calendar; empty outside the range.
 * Source: ISO 8601:2004, 4.1.
 */
export function isoDateFromJd(jd: number): string {
  const { year, month, day } = calendarFromJd(jd, 'gregorian')
  if (!(year >= 0 && year <= 9999)) return ''
  return `${padded(year, 4)}-${padded(month, 2)}-${padded(Math.floor(day), 2)}`
}

/**
 * A Julian date in ISO 8601, rounded to the second.
 * @param jd JD of UTC, d, of the years 0 to 9999.
 * @returns yyyy-mm-ddThh:mm:ssZ in the Gregorian calendar; empty outside the range.
 * Source: ISO 8601:2004, 4.3.
 */
export function isoTimeFromJd(jd: number): string {
  const wholeSeconds = Math.round((jd + 0.5 - Math.floor(jd + 0.5)) * SECONDS_PER_DAY)
  const day = Math.floor(jd + 0.5) - 0.5 + (wholeSeconds === SECONDS_PER_DAY ? 1 : 0)
  const seconds = wholeSeconds === SECONDS_PER_DAY ? 0 : wholeSeconds
  const date = isoDateFromJd(day)
  if (date === '') return ''
  return `${date}T${padded(Math.floor(seconds / 3600), 2)}:${padded(Math.floor(seconds / 60) % 60, 2)}:${padded(seconds % 60, 2)}Z`
}

function padded(value: number, width: number): string {
  return String(value).padStart(width, '0')
}
