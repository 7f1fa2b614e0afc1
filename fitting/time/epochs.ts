/**
 * Julian dates and epochs in years.
 *
 * Symbols: JD Julian date (d), MJD modified Julian date, J Julian epoch (years of 365.25 d about 2000.0), B Besselian epoch (tropical years
 * of 365.242198781 d about B1900.0).
 *   J = 2000 + (JD − 2451545)/365.25        B = 1900 + (JD − 2415020.31352)/365.242198781
 *
 * Source: Lieske 1979, Precession matrix based on IAU (1976) system of astronomical constants, A&A 73, 282.
 */

/** Julian date of J2000.0, 2000 January 1, 12h TT. */
export const JD_J2000 = 2451545
/** Days of a Julian year. */
export const DAYS_PER_JULIAN_YEAR = 365.25
/** Julian date of B1900.0. */
export const JD_B1900 = 2415020.31352
/** Days of the tropical year at B1900.0. */
export const DAYS_PER_TROPICAL_YEAR = 365.242198781
/** Julian date of MJD 0. */
export const JD_MJD0 = 2400000.5
/** Bare epochs of double-star measures below it are taken as Besselian, from it on as Julian. */
export const FIRST_JULIAN_YEAR = 1984

/**
 * Julian epoch of a Julian date.
 * @param jd JD, d.
 * @returns J, Julian years.
 * Source: Lieske 1979, A&A 73, 282.
 */
export function julianEpochFromJd(jd: number): number {
  return 2000 + (jd - JD_J2000) / DAYS_PER_JULIAN_YEAR
}

/**
 * Julian date of a Julian epoch.
 * @param epochYr J, Julian years.
 * @returns JD, d.
 * Source: Lieske 1979, A&A 73, 282.
 */
export function jdFromJulianEpoch(epochYr: number): number {
  return JD_J2000 + (epochYr - 2000) * DAYS_PER_JULIAN_YEAR
}

/**
 * Besselian epoch of a Julian date.
 * @param jd JD, d.
 * @returns B, tropical years.
 * Source: Lieske 1979, A&A 73, 282.
 */
export function besselianEpochFromJd(jd: number): number {
  return 1900 + (jd - JD_B1900) / DAYS_PER_TROPICAL_YEAR
}

/**
 * Julian date of a Besselian epoch.
 * @param epochYr B, tropical years.
 * @returns JD, d.
 * Source: Lieske 1979, A&A 73, 282.
 */
export function jdFromBesselianEpoch(epochYr: number): number {
  return JD_B1900 + (epochYr - 1900) * DAYS_PER_TROPICAL_YEAR
}

/**
 * Julian epoch of a Besselian epoch.
 * @param epochYr B, tropical years.
 * @returns J of the same instant, Julian years.
 * Source: Lieske 1979, A&A 73, 282.
 */
export function julianEpochFromBesselian(epochYr: number): number {
  return julianEpochFromJd(jdFromBesselianEpoch(epochYr))
}

/**
 * Besselian epoch of a Julian epoch.
 * @param epochYr J, Julian years.
 * @returns B of the same instant, tropical years.
 * Source: Lieske 1979, A&A 73, 282.
 */
export function besselianEpochFromJulian(epochYr: number): number {
  return besselianEpochFromJd(jdFromJulianEpoch(epochYr))
}

/**
 * Julian epoch of a year as double-star observers write it.
 * @param epochYr year with decimals.
 * @param prefix B or J where it was written; without it Besselian before 1984.0 and Julian from then on.
 * @returns J, Julian years.
 * Source: common practice; the change of 1984 goes back to IAU resolutions of 1976 (Lieske 1979, A&A 73, 282).
 */
export function julianEpochFromWritten(epochYr: number, prefix?: 'B' | 'J'): number {
  const isBesselian = prefix ? prefix === 'B' : epochYr < FIRST_JULIAN_YEAR
  return isBesselian ? julianEpochFromBesselian(epochYr) : epochYr
}

/**
 * Modified Julian date of a Julian date.
 * @param jd JD, d.
 * @returns MJD, d.
 * Source: definition, MJD = JD − 2400000.5.
 */
export function mjdFromJd(jd: number): number {
  return jd - JD_MJD0
}

/**
 * Julian date of a modified Julian date.
 * @param mjd MJD, d.
 * @returns JD, d.
 * Source: definition, MJD = JD − 2400000.5.
 */
export function jdFromMjd(mjd: number): number {
  return mjd + JD_MJD0
}
