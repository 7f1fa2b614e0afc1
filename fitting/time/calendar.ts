/**
 * Calendar dates and Julian dates.
 *
 * Years are astronomical: year 0 is 1 BC, −1 is 2 BC. 'civil' is the Julian calendar to 1582 October 4 and the Gregorian from 1582
 * October 15, the next day; 'gregorian' is the Gregorian calendar carried back before that (as ISO 8601 has it).
 *
 * Source: Meeus 1998, Astronomical Algorithms, 2nd ed., ch. 7.
 */

export const CALENDARS = ['civil', 'gregorian'] as const
export type Calendar = (typeof CALENDARS)[number]

/** A date with the day's fraction. */
export interface CalendarDate {
  year: number
  /** 1 to 12. */
  month: number
  /** Day of the month with its fraction, from 1. */
  day: number
}

const FIRST_GREGORIAN_JD = 2299160.5
const FIRST_YEAR = -4713
const LAST_YEAR = 9999
const MONTH_DAYS = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]

/** Whether the date, taken as a number yyyymmdd, falls in the Gregorian part of the calendar. */
function isGregorian(date: CalendarDate, calendar: Calendar): boolean {
  return calendar === 'gregorian' || date.year * 10000 + date.month * 100 + date.day >= 15821015
}

/**
 * Whether there is such a date.
 * @param date year −4713 to 9999, month, day with fraction.
 * @param calendar civil (default) or gregorian.
 * @returns false for a month or day that does not exist, the dropped days 1582 October 5 to 14 (civil) and years out of range.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 7.
 */
export function isCalendarDate(date: CalendarDate, calendar: Calendar = 'civil'): boolean {
  const { year, month, day } = date
  if (Math.floor(year) !== year || year < FIRST_YEAR || year > LAST_YEAR) return false
  if (Math.floor(month) !== month || month < 1 || month > 12) return false
  if (!(day >= 1)) return false
  const isDropped = calendar === 'civil' && year === 1582 && month === 10 && day >= 5 && day < 15
  return !isDropped && day < daysOfMonth(date, calendar) + 1
}

function daysOfMonth(date: CalendarDate, calendar: Calendar): number {
  const { year, month } = date
  if (month === 2 && isLeapYear(year, isGregorian(date, calendar))) return 29
  return MONTH_DAYS[month - 1]!
}

function isLeapYear(year: number, isGregorianYear: boolean): boolean {
  if (year % 4 !== 0) return false
  return !isGregorianYear || year % 100 !== 0 || year % 400 === 0
}

/**
 * Julian date of a calendar date.
 * @param date year −4713 to 9999, month, day with fraction.
 * @param calendar civil (default) or gregorian.
 * @returns JD, d, in the date's own time scale; NaN where there is no such date.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 7.
 */
export function jdFromCalendar(date: CalendarDate, calendar: Calendar = 'civil'): number {
  if (!isCalendarDate(date, calendar)) return NaN
  const isEarly = date.month <= 2
  const year = isEarly ? date.year - 1 : date.year
  const month = isEarly ? date.month + 12 : date.month
  const century = Math.floor(year / 100)
  const correction = isGregorian(date, calendar) ? 2 - century + Math.floor(century / 4) : 0
  return Math.floor(365.25 * (year + 4716)) + Math.floor(30.6001 * (month + 1)) + (correction - 1524.5) + date.day
}

/**
 * Calendar date of a Julian date.
 * @param jd JD, d, ≥ 0 (civil 4713 BC January 1, noon).
 * @param calendar civil (default) or gregorian.
 * @returns year, month and day with fraction; NaN below 0.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 7.
 */
export function calendarFromJd(jd: number, calendar: Calendar = 'civil'): CalendarDate {
  if (!(jd >= 0)) return { year: NaN, month: NaN, day: NaN }
  const whole = Math.floor(jd + 0.5)
  const fraction = jd + 0.5 - whole
  const b = (calendar === 'gregorian' || jd >= FIRST_GREGORIAN_JD ? toJulianCount(whole) : whole) + 1524
  const c = Math.floor((b - 122.1) / 365.25)
  const d = Math.floor(365.25 * c)
  const e = Math.floor((b - d) / 30.6001)
  const month = e < 14 ? e - 1 : e - 13
  return { year: month > 2 ? c - 4716 : c - 4715, month, day: b - d - Math.floor(30.6001 * e) + fraction }
}

/** The day number that the same date would have in the Julian calendar. */
function toJulianCount(whole: number): number {
  const century = Math.floor((whole - 1867216.25) / 36524.25)
  return whole + 1 + century - Math.floor(century / 4)
}

/**
 * Julian epoch of a year with decimals counted through the calendar year (2024.5 is the middle of 2024, a leap year).
 * @param decimalYear −4713 to 9999, civil calendar.
 * @returns J, Julian years; NaN outside the range.
 * Source: common practice.
 */
export function julianEpochFromCalendarYear(decimalYear: number): number {
  const year = Math.floor(decimalYear)
  const start = jdFromCalendar({ year, month: 1, day: 1 })
  const length = jdFromCalendar({ year, month: 12, day: 31 }) + 1 - start
  return 2000 + (start + (decimalYear - year) * length - 2451545) / 365.25
}
