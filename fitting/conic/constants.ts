/**
 * Constants of the two-body motion, per unit mass.
 *
 * Symbols: μ gravitational parameter, p semi-latus rectum, e eccentricity, r place, v velocity.
 *   ε = v²/2 − μ/r = −μ(1 − e²)/(2p)    h = r × v, |h| = √(μp)    A = v × h − μ·r/|r|, |A| = μe, towards periapsis
 * They are not independent: A·h = 0 and A² = μ² + 2εh².
 *
 * Source: Goldstein 1980, Classical Mechanics, 2nd ed., ch. 3.
 */
import { sinCosInto } from '../elementary'
import type { SpatialElements, StateVectors, Vector } from './state'
import { cross, dot, eccentricityVector, lengthOf } from './state'

/** ε (length²/time²), h (length²/time), A (length³/time²), in the units of the state or of p and μ. */
export interface MotionConstants {
  specificEnergy: number
  angularMomentum: Vector
  laplaceRungeLenz: Vector
}

/** A conic with its orientation; the place on it does not matter. */
export type OrientedConic = Omit<SpatialElements, 'trueAnomalyRad'>

/**
 * Constants of a conic given by its elements.
 * @param conic p (> 0), e (≥ 0), i, Ω, ω (rad); for a conic in the plane of the frame i = Ω = 0 and ω the direction of periapsis.
 * @param gravitationalParameter μ, > 0, length³/time².
 * @returns ε, h and A in the frame of i, Ω, ω.
 * Source: Goldstein 1980, Classical Mechanics, 2nd ed., ch. 3.
 */
export function constantsFromConic(conic: OrientedConic, gravitationalParameter: number): MotionConstants {
  const { semiLatusRectum: p, eccentricity: e } = conic
  const { periapsis, pole } = orientationVectors(conic)
  const h = Math.sqrt(gravitationalParameter * p)
  return {
    specificEnergy: -gravitationalParameter * (1 - e) * (1 + e) / (2 * p),
    angularMomentum: scaled(pole, h),
    laplaceRungeLenz: scaled(periapsis, gravitationalParameter * e),
  }
}

/**
 * Constants of a state.
 * @param state place and velocity.
 * @param gravitationalParameter μ, > 0, length³/time².
 * @returns ε, h and A in the frame of the state.
 * Source: Goldstein 1980, Classical Mechanics, 2nd ed., ch. 3.
 */
export function constantsFromState(state: StateVectors, gravitationalParameter: number): MotionConstants {
  const distance = lengthOf(state.place)
  return {
    specificEnergy: 0.5 * dot(state.velocity, state.velocity) - gravitationalParameter / distance,
    angularMomentum: cross(state.place, state.velocity),
    laplaceRungeLenz: scaled(eccentricityVector(state, gravitationalParameter), gravitationalParameter),
  }
}

/**
 * Largest relative drift of ε, h and A over states that should share them.
 * @param states states along one conic; the first is the standard.
 * @param gravitationalParameter μ, > 0, length³/time².
 * @returns the largest |Δε|/(μ/p), |Δh|/|h|, |ΔA|/μ (scales that do not vanish for circle or parabola); 0 below two states.
 * Source: Goldstein 1980, Classical Mechanics, 2nd ed., ch. 3.
 */
export function largestDrift(states: readonly StateVectors[], gravitationalParameter: number): number {
  const [first, ...others] = states
  if (!first) return 0
  const standard = constantsFromState(first, gravitationalParameter)
  const h = lengthOf(standard.angularMomentum)
  const energyScale = gravitationalParameter * gravitationalParameter / (h * h)
  let largest = 0
  for (const state of others) {
    const constants = constantsFromState(state, gravitationalParameter)
    largest = Math.max(
      largest,
      Math.abs(constants.specificEnergy - standard.specificEnergy) / energyScale,
      lengthOf(difference(constants.angularMomentum, standard.angularMomentum)) / h,
      lengthOf(difference(constants.laplaceRungeLenz, standard.laplaceRungeLenz)) / gravitationalParameter,
    )
  }
  return largest
}

/**
 * State in the plane of an ellipse from its eccentric anomaly, x towards periapsis.
 * @param ellipse a (> 0), e (0 ≤ e < 1) and μ (> 0) in one set of units.
 * @param sinE sin E.
 * @param cosE cos E.
 * @returns place and velocity, third components 0.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function stateFromEccentric(ellipse: { semiMajorAxis: number, eccentricity: number, gravitationalParameter: number }, sinE: number, cosE: number): StateVectors {
  const { semiMajorAxis: a, eccentricity: e } = ellipse
  const shortAxis = a * Math.sqrt((1 - e) * (1 + e))
  const rate = Math.sqrt(ellipse.gravitationalParameter / a) / a / (1 - e * cosE)
  return {
    place: [a * (cosE - e), shortAxis * sinE, 0],
    velocity: [-a * sinE * rate, shortAxis * cosE * rate, 0],
  }
}

const turn = new Float64Array(2)

/** Unit vectors towards periapsis and along h. */
function orientationVectors(conic: OrientedConic): { periapsis: Vector, pole: Vector } {
  sinCosInto(conic.inclinationRad, turn)
  const sinTilt = turn[0]!
  const cosTilt = turn[1]!
  sinCosInto(conic.nodeRad, turn)
  const sinNode = turn[0]!
  const cosNode = turn[1]!
  sinCosInto(conic.argumentOfPeriapsisRad, turn)
  const along = turn[1]!
  const across = turn[0]!
  return {
    periapsis: [along * cosNode - across * sinNode * cosTilt, along * sinNode + across * cosNode * cosTilt, across * sinTilt],
    pole: [sinNode * sinTilt, -cosNode * sinTilt, cosTilt],
  }
}

function scaled(a: Vector, factor: number): Vector {
  return [a[0] * factor, a[1] * factor, a[2] * factor]
}

function difference(a: Vector, b: Vector): Vector {
  return [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}
