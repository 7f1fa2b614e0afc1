import { julianEpochFromJd, readIsoTime, ttFromUtc } from '../../fitting/time'
import type { Complaint } from './problems'
import { EPOCH_SENTENCES } from './sentences'

export interface TimeOfMeasure {
  /** ISO 8601 with milliseconds and Z. */
  iso: string
  /** Julian year, TT. */
  epochYr: number
}

export type ReadTime = { ok: true; time: TimeOfMeasure } | { ok: false; complaint: Complaint }

const UNIX_EPOCH_JD = 2_440_587.5
const DAY_MS = 86_400_000
const MONTHS = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December']

/** Reads a date or time in ISO 8601; without a zone it is UTC, and a date alone counts as 0 h. */
export function readTime(text: string): ReadTime {
  const read = readIsoTime(text)
  if (!read.ok) return { ok: false, complaint: complaintAboutTime(text.trim(), read.problem) }
  return { ok: true, time: { iso: millisecondTime(read.jd).iso, epochYr: julianYearOfUtcJd(read.jd) } }
}

/** A Julian date of UTC to the millisecond: as ISO 8601, and as the Julian date that this text stands for. */
export function millisecondTime(jdUtc: number): { iso: string; jdUtc: number } {
  const iso = new Date(Math.round((jdUtc - UNIX_EPOCH_JD) * DAY_MS)).toISOString()
  return { iso, jdUtc: julianDateOfIso(iso) }
}

/** The Julian date of UTC that a time of ours (milliseconds and Z) stands for. */
export function julianDateOfIso(iso: string): number {
  return UNIX_EPOCH_JD + Date.parse(iso) / DAY_MS
}

/** Julian year (TT) of a Julian date in UTC, or in UT before 1972; before 1620, where no table of ΔT reaches, UT is taken for TT. */
export function julianYearOfUtcJd(jdUtc: number): number {
  const jdTt = ttFromUtc(jdUtc)
  return julianEpochFromJd(Number.isNaN(jdTt) ? jdUtc : jdTt)
}

/** What is wrong with a date or time that was understood as such; `written` begins with year-month-day. */
export function complaintAboutTime(written: string, problem: 'not-iso' | 'no-such-date' | 'no-such-time'): Complaint {
  if (problem === 'not-iso') return EPOCH_SENTENCES.notADate()
  if (problem === 'no-such-time') return EPOCH_SENTENCES.noSuchTime()
  const year = Number(written.slice(0, 4))
  const monthName = MONTHS[Number(written.slice(5, 7)) - 1]
  if (!monthName) return EPOCH_SENTENCES.noSuchMonth()
  return EPOCH_SENTENCES.noSuchDay(`${monthName} ${written.slice(0, 4)}`, daysInMonth(year, MONTHS.indexOf(monthName)))
}

function daysInMonth(year: number, monthIndex: number): number {
  return new Date(Date.UTC(year, monthIndex + 1, 0)).getUTCDate()
}
