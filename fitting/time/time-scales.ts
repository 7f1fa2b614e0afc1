/**
 * UTC to TT: TT = TAI + 32.184 s, TAI − UTC whole seconds since 1972; before that TT = UT + ΔT by table.
 *
 * Source: IERS Bulletin C and its list of leap seconds (the list of 2026 July, valid to 2027 June 28).
 */
import { jdFromCalendar } from './calendar'
import { DELTA_T_YEARS, deltaTSeconds } from './delta-t'
import { julianEpochFromJd } from './epochs'

/** TT − TAI, s. */
export const TT_MINUS_TAI_S = 32.184

const SECONDS_PER_DAY = 86400

/** Year, month (from its first day, 0h UTC) and TAI − UTC, s. */
const LEAP_SECONDS: readonly (readonly [number, number, number])[] = [
  [1972, 1, 10], [1972, 7, 11], [1973, 1, 12], [1974, 1, 13], [1975, 1, 14], [1976, 1, 15], [1977, 1, 16], [1978, 1, 17], [1979, 1, 18],
  [1980, 1, 19], [1981, 7, 20], [1982, 7, 21], [1983, 7, 22], [1985, 7, 23], [1988, 1, 24], [1990, 1, 25], [1991, 1, 26], [1992, 7, 27],
  [1993, 7, 28], [1994, 7, 29], [1996, 1, 30], [1997, 7, 31], [1999, 1, 32], [2006, 1, 33], [2009, 1, 34], [2012, 7, 35], [2015, 7, 36],
  [2017, 1, 37],
]

const steps = LEAP_SECONDS.map(([year, month, seconds]) => ({ jdUtc: jdFromCalendar({ year, month, day: 1 }), seconds }))

/** Julian date (UTC) after which a later leap second may be missing from the table: 2027 June 28. */
export const LEAP_SECONDS_EXPIRE_JD = 2461584.5

/**
 * TAI − UTC.
 * @param jdUtc JD of UTC, d, from 1972 January 1.
 * @returns whole seconds; the last known value after the table's expiry; NaN before 1972.
 * Source: IERS Bulletin C.
 */
export function taiMinusUtcSeconds(jdUtc: number): number {
  let seconds = NaN
  for (const step of steps) if (jdUtc >= step.jdUtc) seconds = step.seconds
  return seconds
}

/**
 * TT − UTC (before 1972 TT − UT).
 * @param jdUtc JD of UTC or UT, d, from 1620.
 * @returns s: exact to the table's expiry from 1972, by ΔT before (0.2 s after 1900, several seconds before 1700); NaN before 1620.
 * Source: IERS Bulletin C; Meeus 1998, Astronomical Algorithms, Table 10.A.
 */
export function ttMinusUtcSeconds(jdUtc: number): number {
  const taiMinusUtc = taiMinusUtcSeconds(jdUtc)
  if (taiMinusUtc === taiMinusUtc) return taiMinusUtc + TT_MINUS_TAI_S
  const epochYr = julianEpochFromJd(jdUtc)
  return epochYr < DELTA_T_YEARS.first ? NaN : deltaTSeconds(epochYr)
}

/**
 * Julian date of TT from that of UTC.
 * @param jdUtc JD of UTC (before 1972 of UT), d, from 1620.
 * @returns JD of TT, d; NaN before 1620.
 * Source: IERS Bulletin C; Meeus 1998, Astronomical Algorithms, Table 10.A.
 */
export function ttFromUtc(jdUtc: number): number {
  return jdUtc + ttMinusUtcSeconds(jdUtc) / SECONDS_PER_DAY
}
