import { calendarFromJd } from '../../fitting/time'
import { formatNumber } from './number-text'

/** Dates and spans of time as pages and mail write them: day, short month, year; always UTC. */

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']
const MINUTE_MS = 60_000
const HOUR_MS = 60 * MINUTE_MS
const DAY_MS = 24 * HOUR_MS

function readInstant(isoInstant: string): Date {
  const date = new Date(isoInstant)
  if (Number.isNaN(date.getTime())) throw new RangeError(`not an ISO 8601 instant: ${isoInstant}`)
  return date
}

/**
 * Writes the day of an instant, such as "14 Mar 2026".
 * @param isoInstant ISO 8601 with its offset, such as 2026-03-14T21:04:00.000Z
 * @returns the UTC day
 * @throws RangeError where the text is no instant
 */
export function formatDate(isoInstant: string): string {
  const date = readInstant(isoInstant)
  return `${date.getUTCDate()} ${MONTHS[date.getUTCMonth()]} ${date.getUTCFullYear()}`
}

/**
 * Writes an instant to the minute, such as "14 Mar 2026, 21:04 UTC".
 * @param isoInstant ISO 8601 with its offset
 * @returns day and time of day, UTC
 * @throws RangeError where the text is no instant
 */
export function formatDateTime(isoInstant: string): string {
  return `${formatDate(isoInstant)}, ${readInstant(isoInstant).toISOString().slice(11, 16)} UTC`
}

/**
 * Writes how long something has waited, in the largest whole unit: "6 days", "5 hours", "1 minute", "moments".
 * @param fromIso ISO 8601 instant at which the waiting began
 * @param toIso ISO 8601 instant now; a time before fromIso counts as none
 * @returns the span in words
 * @throws RangeError where either text is no instant
 */
export function formatWaiting(fromIso: string, toIso: string): string {
  const spanMs = readInstant(toIso).getTime() - readInstant(fromIso).getTime()
  for (const [unitMs, word] of [[DAY_MS, 'day'], [HOUR_MS, 'hour'], [MINUTE_MS, 'minute']] as const) {
    if (spanMs >= unitMs) return formatCount(Math.floor(spanMs / unitMs), word)
  }
  return 'moments'
}

/**
 * Writes a count with its noun in the right number: "1 measure", "43 measures".
 * @param count whole number, at least 0
 * @param singular the noun for one
 * @param plural the noun for any other count; default singular + "s"
 * @returns count and noun
 */
export function formatCount(count: number, singular: string, plural = `${singular}s`): string {
  return `${count} ${count === 1 ? singular : plural}`
}

/**
 * Writes the day of a Julian date, such as "14 Mar".
 * @param jd Julian date, d, of whichever scale
 * @param withYear whether the year follows
 * @returns day, short month and, where asked for, the year
 */
export function formatJulianDay(jd: number, withYear = false): string {
  const { year, month, day } = calendarFromJd(jd, 'gregorian')
  return `${Math.floor(day)} ${MONTHS[month - 1]}${withYear ? ` ${year}` : ''}`
}

/**
 * Writes a Julian date as the trade writes a time of perihelion: year, month, day with decimals.
 * @param jd Julian date, d
 * @param decimals of the day, 0 to 9
 * @returns such as "2026 Apr 12.314"; a day that rounds up goes over to the next date
 */
export function formatJulianDate(jd: number, decimals: number): string {
  const scale = 10 ** Math.min(9, Math.max(0, decimals))
  const { year, month, day } = calendarFromJd(Math.round((jd + 0.5) * scale) / scale - 0.5, 'gregorian')
  return `${year} ${MONTHS[month - 1]} ${formatNumber(day, Math.max(0, decimals))}`
}

/**
 * Writes an instant to the second for tables, such as "2026-03-14 20:51:07".
 * @param isoInstant ISO 8601 with its offset
 * @returns day and time of day, UTC
 * @throws RangeError where the text is no instant
 */
export function formatUtcTime(isoInstant: string): string {
  return new Date(Math.round(readInstant(isoInstant).getTime() / 1000) * 1000).toISOString().slice(0, 19).replace('T', ' ')
}
