/**
 * Elements of an orbit about the Sun, ecliptic and equinox of J2000, and its state on equatorial axes.
 * q = h²/μ/(1 + e) and the time of perihelion by Kepler's equation in the form that is smooth through e = 1.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6; IAU 1976: ε = 84381.448″.
 */
import { meanFromTrueRad, meanMotion, placeAtTime } from '../conic/anomalies'
import { elementsFromState, stateFromElements, type Vector } from '../conic/state'
import { eclipticFromEquatorial, equatorialFromEcliptic, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import { PI, TWO_PI } from '../elementary'

/** An orbit about the Sun; angles rad, ecliptic and equinox of J2000. */
export interface PerihelionElements {
  /** q, au, > 0. */
  perihelionDistanceAu: number
  /** e, ≥ 0. */
  eccentricity: number
  inclinationRad: number
  nodeRad: number
  argumentOfPerihelionRad: number
  /** JD of TT. */
  perihelionTimeJdTt: number
}

/**
 * Elements of a heliocentric state.
 * @param state place (au) and velocity (au/d), equatorial axes of the ICRS, not a fall into the Sun.
 * @param jdTt JD of TT of the state.
 * @returns elements, the passage of perihelion nearest to the state.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function perihelionFromState(state: ArrayLike<number>, jdTt: number): PerihelionElements {
  const place = eclipticFromEquatorial([state[0]!, state[1]!, state[2]!])
  const velocity = eclipticFromEquatorial([state[3]!, state[4]!, state[5]!])
  const elements = elementsFromState({ place, velocity }, MU)
  const e = elements.eccentricity
  const q = elements.semiLatusRectum / (1 + e)
  const nu = elements.trueAnomalyRad > PI ? elements.trueAnomalyRad - TWO_PI : elements.trueAnomalyRad
  const sinceDays = meanFromTrueRad(nu, e) / meanMotion({ periapsisDistance: q, eccentricity: e, gravitationalParameter: MU })
  return {
    perihelionDistanceAu: q, eccentricity: e, inclinationRad: elements.inclinationRad, nodeRad: elements.nodeRad,
    argumentOfPerihelionRad: elements.argumentOfPeriapsisRad, perihelionTimeJdTt: jdTt - sinceDays,
  }
}

/**
 * Heliocentric state of elements.
 * @param elements of any e ≥ 0.
 * @param jdTt JD of TT.
 * @returns place (au) and velocity (au/d), equatorial axes of the ICRS, six numbers.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function stateFromPerihelion(elements: PerihelionElements, jdTt: number): Float64Array {
  const { perihelionDistanceAu: q, eccentricity: e } = elements
  const motion = { periapsisDistance: q, eccentricity: e, gravitationalParameter: MU }
  const { trueAnomalyRad } = placeAtTime(motion, jdTt - elements.perihelionTimeJdTt)
  const { place, velocity } = stateFromElements({
    semiLatusRectum: q * (1 + e), eccentricity: e, inclinationRad: elements.inclinationRad, nodeRad: elements.nodeRad,
    argumentOfPeriapsisRad: elements.argumentOfPerihelionRad, trueAnomalyRad,
  }, MU)
  const turned: [Vector, Vector] = [equatorialFromEcliptic(place), equatorialFromEcliptic(velocity)]
  return Float64Array.of(...turned[0], ...turned[1])
}
