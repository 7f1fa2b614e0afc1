/**
 * The observer of one measure: time, place about the Sun and the Sun's own velocity, to be computed once a measure and kept.
 *
 * A body at heliocentric r(t), light-time τ, is seen from the heliocentric place E along d = r(t − τ) − E(t) − V·τ, V the velocity of the
 * Sun about the barycentre: astrometric places on the axes of the ICRS, without stellar aberration and deflection.
 *
 * Source: Kaplan et al. 1989, Mean and apparent place computations in the new IAU system III, AJ 97, 1197.
 */
import type { Vector } from '../conic/state'
import { ttFromUtc } from '../time/time-scales'
import { earthHeliocentric, sunBarycentricVelocity } from './earth-state'
import type { StationPlace } from './station'
import { stationVector } from './station'

/** Where and when a measure was made. */
export interface ObserverPlace {
  /** JD of TT, d. */
  jdTt: number
  /** Heliocentric place of the station, au, axes of the ICRS. */
  place: Vector
  /** Velocity of the Sun about the barycentre, au/d, axes of the ICRS. */
  sunVelocity: Vector
}

const earth = new Float64Array(6)
const station3 = new Float64Array(3)
const sun = new Float64Array(3)

/**
 * Time, heliocentric place and the Sun's velocity for one measure.
 * @param station parallax constants or a geodetic place; parallax constants of 0 are the Earth's centre.
 * @param jdUtc JD of UTC (before 1972 of UT), d, from 1620.
 * @returns the observer; NaN before 1620.
 * Source: Kaplan et al. 1989, AJ 97, 1197; the parts as earthHeliocentric, stationVector and ttFromUtc.
 */
export function observerHeliocentric(station: StationPlace, jdUtc: number): ObserverPlace {
  const jdTt = ttFromUtc(jdUtc)
  earthHeliocentric(jdTt, earth)
  stationVector(station, jdUtc, jdTt, station3)
  sunBarycentricVelocity(jdTt, sun)
  return {
    jdTt,
    place: [earth[0]! + station3[0]!, earth[1]! + station3[1]!, earth[2]! + station3[2]!],
    sunVelocity: [sun[0]!, sun[1]!, sun[2]!],
  }
}
