/**
 * The Earth's rotation: sidereal time, and vectors on the axes of date turned to those of the ICRS.
 *
 * UT1 is taken as UTC: they differ by at most 0.9 s, which turns a station by 0.42 km at most. Polar motion (10 m) is left out. Of the
 * terms that complete the equation of the equinoxes the two above 1e-5″ are kept.
 *
 * Sources: Capitaine, Guinot & McCarthy 2000, Definition of the Celestial Ephemeris Origin and of UT1, A&A 355, 398 (rotation angle);
 * Capitaine, Wallace & Chapront 2003, A&A 412, 567 (sidereal time IAU 2006); Hilton et al. 2006, Celestial Mechanics and Dynamical
 * Astronomy 94, 351 (matrix).
 */
import { cos, DEG, sin, sinCosInto, TWO_PI } from '../elementary'
import { DAYS_PER_JULIAN_YEAR, JD_J2000 } from '../time/epochs'
import type { Nutation, PrecessionAngles } from './nutation'
import { nutation, precessionAngles } from './nutation'

/** Orientation of the Earth at one time: what turns a station. */
export interface EarthOrientation {
  /** Greenwich apparent sidereal time, rad, 0 to 2π. */
  siderealRad: number
  precession: PrecessionAngles
  nutation: Nutation
}

const ARCSEC = DEG / 3600

function centuries(jdTt: number): number {
  return (jdTt - JD_J2000) / (100 * DAYS_PER_JULIAN_YEAR)
}

function withinTurn(angleRad: number): number {
  return angleRad - TWO_PI * Math.floor(angleRad / TWO_PI)
}

/**
 * Earth rotation angle.
 * @param jdUt1 JD of UT1 (UTC serves), d.
 * @returns rad, 0 to 2π.
 * Source: Capitaine, Guinot & McCarthy 2000, A&A 355, 398 (IAU 2000).
 */
export function earthRotationAngleRad(jdUt1: number): number {
  const days = jdUt1 - JD_J2000
  const dayFraction = days - Math.floor(days)
  return withinTurn(TWO_PI * (dayFraction + 0.7790572732640 + 0.00273781191135448 * days))
}

/**
 * Mean sidereal time at Greenwich.
 * @param jdUt1 JD of UT1 (UTC serves), d.
 * @param jdTt JD of TT of the same instant, d.
 * @returns rad, 0 to 2π.
 * Source: Capitaine, Wallace & Chapront 2003, A&A 412, 567 (IAU 2006).
 */
export function greenwichMeanSiderealRad(jdUt1: number, jdTt: number): number {
  const t = centuries(jdTt)
  const ofPrecession = 0.014506 + t * (4612.156534 + t * (1.3915817 + t * (-0.00000044 + t * (-0.000029956 + t * -0.0000000368))))
  return withinTurn(earthRotationAngleRad(jdUt1) + ARCSEC * ofPrecession)
}

/**
 * Orientation of the Earth: apparent sidereal time, precession and nutation.
 * @param jdUt1 JD of UT1 (UTC serves), d.
 * @param jdTt JD of TT of the same instant, d.
 * @returns what stationVector and toIcrsAxes work from.
 * Source: Hilton et al. 2006, Celestial Mechanics and Dynamical Astronomy 94, 351; IERS Conventions 2010, ch. 5 (terms in Ω).
 */
export function earthOrientation(jdUt1: number, jdTt: number): EarthOrientation {
  const t = centuries(jdTt)
  const precession = precessionAngles(t)
  const nutationOfDate = nutation(t)
  const node = nutationOfDate.moonNodeRad
  const completing = ARCSEC * (0.00264096 * sin(node) + 0.00006352 * sin(2 * node))
  const ofEquinox = nutationOfDate.longitudeRad * cos(precession.obliquityRad) + completing
  return { siderealRad: withinTurn(greenwichMeanSiderealRad(jdUt1, jdTt) + ofEquinox), precession, nutation: nutationOfDate }
}

/**
 * Turns a vector from the true equator and equinox of date to the axes of the ICRS, in place.
 * @param orientation of the date.
 * @param vector three components, any unit.
 * Source: Hilton et al. 2006, Celestial Mechanics and Dynamical Astronomy 94, 351.
 */
export function toIcrsAxes(orientation: EarthOrientation, vector: Float64Array): void {
  const { precession, nutation: ofDate } = orientation
  turn(vector, 1, precession.obliquityRad + ofDate.obliquityRad)
  turn(vector, 0, precession.psiRad + ofDate.longitudeRad)
  turn(vector, 1, -precession.phiRad)
  turn(vector, 0, -precession.gammaRad)
}

const angle = new Float64Array(2)

/** Components on axes turned by an angle about x (y and z change: from = 1) or about z (x and y change: from = 0). */
function turn(vector: Float64Array, from: number, angleRad: number): void {
  sinCosInto(angleRad, angle)
  const first = vector[from]!
  const second = vector[from + 1]!
  vector[from] = angle[1]! * first + angle[0]! * second
  vector[from + 1] = angle[1]! * second - angle[0]! * first
}
