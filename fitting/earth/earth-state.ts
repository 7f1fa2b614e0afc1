/**
 * The Earth about the Sun, and the Sun about the barycentre of the solar system, on the axes of the ICRS.
 *
 * Harmonic series of the simplified planetary solution VSOP2000, turned to the axes of the ICRS. Against the ephemeris DE405 over 1900 to
 * 2100 its authors found the heliocentric Earth within 11.2 km (rms 3.7 km) and 5 mm/s; twice as much by 1800 and 2200, ten times by 1500
 * and 2500. TDB is taken as TT: they differ by at most 1.7 ms, which moves the Earth by 50 m.
 *
 * Source: Moisson & Bretagnon 2001, Analytical planetary solution VSOP2000, Celestial Mechanics and Dynamical Astronomy 80, 205, in the
 * form of eraEpv00 of ERFA 2.0 (see LICENSE-ERFA).
 */
import { DAYS_PER_JULIAN_YEAR, JD_J2000 } from '../time/epochs'
import { EARTH_TERMS } from './epv-earth-terms'
import { SUN_TERMS } from './epv-sun-terms'
import { evaluateSeriesInto, gatherSeries } from './harmonic-series'

/** Julian years between which the series is as good as stated. */
export const EARTH_SERIES_YEARS = { first: 1900, last: 2100 }

const earthSeries = gatherSeries(EARTH_TERMS)
const sunSeries = gatherSeries(SUN_TERMS)

// Turn from the ecliptic axes of the theory to the ICRS: 23° 26′ 21.4091″ about x, then 0.0475″ about z (fitted to DE405).
const XY = 0.000000211284
const XZ = -0.000000091603
const YX = -0.000000230286
const COS_OBLIQUITY = 0.917482137087
const SIN_OBLIQUITY = 0.397776982902

/**
 * Heliocentric state of the Earth's centre.
 * @param jdTt JD of TT, d.
 * @param out receives x, y, z (au) and vx, vy, vz (au/d) on the axes of the ICRS; NaN where jdTt is no finite number.
 * Source: Moisson & Bretagnon 2001, Celestial Mechanics and Dynamical Astronomy 80, 205 (1,323 terms of eraEpv00).
 */
export function earthHeliocentric(jdTt: number, out: Float64Array): void {
  stateOfSeries(earthSeries, jdTt, out)
}

/**
 * State of the Sun about the barycentre of the solar system.
 * @param jdTt JD of TT, d.
 * @param out receives x, y, z (au) and vx, vy, vz (au/d) on the axes of the ICRS; NaN where jdTt is no finite number.
 * Source: Moisson & Bretagnon 2001, Celestial Mechanics and Dynamical Astronomy 80, 205 (628 terms of eraEpv00).
 */
export function sunBarycentric(jdTt: number, out: Float64Array): void {
  stateOfSeries(sunSeries, jdTt, out)
}

const sunState = new Float64Array(6)

/**
 * Velocity of the Sun about the barycentre of the solar system.
 * @param jdTt JD of TT, d.
 * @param out receives vx, vy, vz, au/d, on the axes of the ICRS, at [0] to [2]; NaN where jdTt is no finite number.
 * Source: Moisson & Bretagnon 2001, Celestial Mechanics and Dynamical Astronomy 80, 205 (628 terms of eraEpv00).
 */
export function sunBarycentricVelocity(jdTt: number, out: Float64Array): void {
  sunBarycentric(jdTt, sunState)
  out[0] = sunState[3]!
  out[1] = sunState[4]!
  out[2] = sunState[5]!
}

function stateOfSeries(series: typeof earthSeries, jdTt: number, out: Float64Array): void {
  evaluateSeriesInto(series, (jdTt - JD_J2000) / DAYS_PER_JULIAN_YEAR, out)
  for (let k = 3; k < 6; k++) out[k]! /= DAYS_PER_JULIAN_YEAR
  toIcrs(out, 0)
  toIcrs(out, 3)
}

/** Turns the three components from an index on, in place. */
function toIcrs(vector: Float64Array, from: number): void {
  const x = vector[from]!
  const y = vector[from + 1]!
  const z = vector[from + 2]!
  vector[from] = x + XY * y + XZ * z
  vector[from + 1] = YX * x + COS_OBLIQUITY * y - SIN_OBLIQUITY * z
  vector[from + 2] = SIN_OBLIQUITY * y + COS_OBLIQUITY * z
}
