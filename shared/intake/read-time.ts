import type { Complaint } from './problems'
import { EPOCH_SENTENCES } from './sentences'

export type ReadTime = { ok: true; iso: string } | { ok: false; complaint: Complaint }

const ISO = /^(\d{4})-(\d{1,2})-(\d{1,2})(?:[T ](\d{1,2}):(\d{2})(?::(\d{2}(?:\.\d+)?))?\s*(Z|UTC?|[+-]\d{2}:?\d{2})?)?Z?$/i
const MONTHS = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December']
/** Date.UTC takes the years 0 to 99 for 1900 to 1999. */
const FIRST_FOUR_DIGIT_YEAR = 1000
const MINUTE_MS = 60_000

/**
 * Reads a date or time in ISO 8601; without a zone it is UTC, and a date alone counts as 0 h.
 * The answer has milliseconds and Z.
 */
export function readTime(text: string): ReadTime {
  const match = ISO.exec(text.trim())
  if (!match) return { ok: false, complaint: EPOCH_SENTENCES.notADate() }
  const [year, month, day, hour, minute] = match.slice(1, 6).map(part => Number(part ?? 0)) as [number, number, number, number, number]
  const second = Number(match[6] ?? 0)
  if (year < FIRST_FOUR_DIGIT_YEAR) return { ok: false, complaint: EPOCH_SENTENCES.notADate() }
  if (month < 1 || month > 12) return { ok: false, complaint: EPOCH_SENTENCES.noSuchMonth() }
  const days = daysInMonth(year, month)
  if (day < 1 || day > days) return { ok: false, complaint: EPOCH_SENTENCES.noSuchDay(`${MONTHS[month - 1]} ${year}`, days) }
  if (hour > 23 || minute > 59 || second >= 60) return { ok: false, complaint: EPOCH_SENTENCES.noSuchTime() }
  const localMs = Date.UTC(year, month - 1, day, hour, minute) + Math.round(second * 1000)
  return { ok: true, iso: new Date(localMs - offsetMinutes(match[7]) * MINUTE_MS).toISOString() }
}

function daysInMonth(year: number, month: number): number {
  return new Date(Date.UTC(year, month, 0)).getUTCDate()
}

function offsetMinutes(zone: string | undefined): number {
  const match = /^([+-])(\d{2}):?(\d{2})$/.exec(zone ?? '')
  if (!match) return 0
  return (match[1] === '-' ? -1 : 1) * (Number(match[2]) * 60 + Number(match[3]))
}
