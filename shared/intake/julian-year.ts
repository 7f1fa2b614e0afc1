/** Times of measures as Julian years. */

const J2000_JD = 2_451_545
const DAYS_A_JULIAN_YEAR = 365.25
const B1900_JD = 2_415_020.31352
const DAYS_A_TROPICAL_YEAR = 365.242198781
const UNIX_EPOCH_JD = 2_440_587.5
const DAY_MS = 86_400_000

export function julianYearOfJd(jd: number): number {
  return 2000 + (jd - J2000_JD) / DAYS_A_JULIAN_YEAR
}

/** Source: Lieske 1979, "Precession matrix based on IAU (1976) system of astronomical constants", A&A 73, 282. */
export function julianYearOfBesselian(besselianYr: number): number {
  return julianYearOfJd(B1900_JD + (besselianYr - 1900) * DAYS_A_TROPICAL_YEAR)
}

/** @param iso ISO 8601 with Z */
export function julianYearOfIso(iso: string): number {
  return julianYearOfJd(UNIX_EPOCH_JD + Date.parse(iso) / DAY_MS)
}
