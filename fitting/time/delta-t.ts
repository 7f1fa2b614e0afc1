/**
 * ΔT = TT − UT from 1620 to 2010, for times before UTC ran on atomic seconds.
 *
 * Source: Meeus 1998, Astronomical Algorithms, 2nd ed., Table 10.A (2000 to 2010 extended with observed values).
 */

const FIRST_YEAR = 1620
const STEP_YR = 2

/** ΔT in seconds at 1620.0, 1622.0 … 2010.0. */
const DELTA_T_S = [
  121, 112, 103, 95, 88, 82, 77, 72, 68, 63, 60, 56, 53, 51, 48, 46, 44, 42, 40, 38,
  35, 33, 31, 29, 26, 24, 22, 20, 18, 16, 14, 12, 11, 10, 9, 8, 7, 7, 7, 7,
  7, 7, 8, 8, 9, 9, 9, 9, 9, 10, 10, 10, 10, 10, 10, 10, 10, 11, 11, 11,
  11, 11, 12, 12, 12, 12, 13, 13, 13, 14, 14, 14, 14, 15, 15, 15, 15, 15, 16, 16,
  16, 16, 16, 16, 16, 16, 15, 15, 14, 13, 13.1, 12.5, 12.2, 12.0, 12.0, 12.0, 12.0, 12.0, 12.0, 11.9,
  11.6, 11.0, 10.2, 9.2, 8.2, 7.1, 6.2, 5.6, 5.4, 5.3, 5.4, 5.6, 5.9, 6.2, 6.5, 6.8, 7.1, 7.3, 7.5, 7.6,
  7.7, 7.3, 6.2, 5.2, 2.7, 1.4, -1.2, -2.8, -3.8, -4.8, -5.5, -5.3, -5.6, -5.7, -5.9, -6.0, -6.3, -6.5, -6.2, -4.7,
  -2.8, -0.1, 2.6, 5.3, 7.7, 10.4, 13.3, 16.0, 18.2, 20.2, 21.1, 22.4, 23.5, 23.8, 24.3, 24.0, 23.9, 23.9, 23.7, 24.0,
  24.3, 25.3, 26.2, 27.3, 28.2, 29.1, 30.0, 30.7, 31.4, 32.2, 33.1, 34.0, 35.0, 36.5, 38.3, 40.2, 42.2, 44.5, 46.5, 48.5,
  50.5, 52.2, 53.8, 54.9, 55.8, 56.9, 58.3, 60.0, 61.6, 63.0, 63.8, 64.3, 64.6, 64.8, 65.5, 66.1,
]

/** First and last year of the table. */
export const DELTA_T_YEARS = { first: FIRST_YEAR, last: FIRST_YEAR + STEP_YR * (DELTA_T_S.length - 1) }

/**
 * ΔT by second differences in the table.
 * @param epochYr year with decimals, 1620 to 2010.
 * @returns TT − UT, s, to about 0.2 s after 1900 and several seconds before 1700; NaN outside the table.
 * Source: Meeus 1998, Astronomical Algorithms, Table 10.A and ch. 3 (interpolation from three values).
 */
export function deltaTSeconds(epochYr: number): number {
  const place = (epochYr - FIRST_YEAR) / STEP_YR
  const last = DELTA_T_S.length - 1
  if (!(place >= 0 && place <= last)) return NaN
  const middle = Math.min(Math.max(Math.round(place), 1), last - 1)
  const before = DELTA_T_S[middle]! - DELTA_T_S[middle - 1]!
  const after = DELTA_T_S[middle + 1]! - DELTA_T_S[middle]!
  const n = place - middle
  return DELTA_T_S[middle]! + n / 2 * (before + after + n * (after - before))
}
