/**
 * State vectors and orientation in space.
 *
 * Symbols: r place, v velocity (3-vectors), μ gravitational parameter, h = r × v angular momentum, p semi-latus rectum, e eccentricity,
 * i inclination, Ω longitude of the ascending node, ω argument of periapsis, ν true anomaly (rad). Any e ≥ 0; h ≠ 0.
 *
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
import { atan2, hypot, PI, sinCosInto, TWO_PI } from '../elementary'
import { meanFromTrueRad, meanMotion, trueFromMeanRad } from './anomalies'
import { withinTurn } from './thiele-innes'

export type Vector = readonly [number, number, number]

/** Place and velocity at one time, in one unit of length and one of time. */
export interface StateVectors {
  place: Vector
  velocity: Vector
}

/** A conic in space with the place of the body on it. */
export interface SpatialElements {
  /** p, > 0, unit of length. */
  semiLatusRectum: number
  /** e, ≥ 0. */
  eccentricity: number
  inclinationRad: number
  nodeRad: number
  argumentOfPeriapsisRad: number
  trueAnomalyRad: number
}

/** Below this e the periapsis has no direction; below this sin i the node has none. */
const NO_DIRECTION = 1e-11

/**
 * Vector product.
 * @param a first vector.
 * @param b second vector.
 * @returns a × b, in the product of their units.
 * Source: definition.
 */
export function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]
}

/**
 * Scalar product.
 * @param a first vector.
 * @param b second vector.
 * @returns a · b, in the product of their units.
 * Source: definition.
 */
export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

/**
 * Length of a vector.
 * @param a vector.
 * @returns |a|, in its unit, ≥ 0.
 * Source: definition.
 */
export function lengthOf(a: Vector): number {
  return hypot(hypot(a[0], a[1]), a[2])
}

/**
 * Vector e = v × h/μ − r/|r|, towards periapsis, of length e.
 * @param state place and velocity.
 * @param gravitationalParameter μ, > 0, length³/time².
 * @returns the vector, dimensionless.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function eccentricityVector(state: StateVectors, gravitationalParameter: number): Vector {
  const turned = cross(state.velocity, cross(state.place, state.velocity))
  const distance = lengthOf(state.place)
  return [
    turned[0] / gravitationalParameter - state.place[0] / distance,
    turned[1] / gravitationalParameter - state.place[1] / distance,
    turned[2] / gravitationalParameter - state.place[2] / distance,
  ]
}

/**
 * Elements of a state. Where the node has no direction (i = 0 or 180°) Ω is 0; where the periapsis has none (e = 0) ω is 0 and ν counts
 * from the node.
 * @param state place and velocity, not parallel.
 * @param gravitationalParameter μ, > 0, length³/time².
 * @returns p, e, i, Ω, ω, ν; angles 0 to 2π, i 0 to π.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function elementsFromState(state: StateVectors, gravitationalParameter: number): SpatialElements {
  const h = cross(state.place, state.velocity)
  const hLength = lengthOf(h)
  const e = eccentricityVector(state, gravitationalParameter)
  const eccentricity = lengthOf(e)
  const inPlane = hypot(h[0], h[1])
  const hasNode = inPlane > NO_DIRECTION * hLength
  const node: Vector = hasNode ? [-h[1] / inPlane, h[0] / inPlane, 0] : [1, 0, 0]
  const periapsis: Vector = eccentricity > NO_DIRECTION ? e : node
  return {
    semiLatusRectum: hLength * hLength / gravitationalParameter,
    eccentricity,
    inclinationRad: atan2(inPlane, h[2]),
    nodeRad: hasNode ? withinTurn(atan2(node[1], node[0])) : 0,
    argumentOfPeriapsisRad: angleAbout(h, hLength, node, periapsis),
    trueAnomalyRad: angleAbout(h, hLength, periapsis, state.place),
  }
}

/** Angle from one vector to another, counted about the axis, 0 to 2π. */
function angleAbout(axis: Vector, axisLength: number, from: Vector, to: Vector): number {
  return withinTurn(atan2(dot(cross(from, to), axis) / axisLength, dot(from, to)))
}

const turn = new Float64Array(2)

/**
 * State of elements.
 * @param elements p, e, i, Ω, ω, ν; 1 + e·cos ν > 0.
 * @param gravitationalParameter μ, > 0, length³/time².
 * @returns place and velocity in the units of p and μ.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function stateFromElements(elements: SpatialElements, gravitationalParameter: number): StateVectors {
  const { semiLatusRectum: p, eccentricity: e } = elements
  sinCosInto(elements.trueAnomalyRad, turn)
  const sinTrue = turn[0]!
  const cosTrue = turn[1]!
  const r = p / (1 + e * cosTrue)
  const speed = Math.sqrt(gravitationalParameter / p)
  return {
    place: toSpace(elements, r * cosTrue, r * sinTrue),
    velocity: toSpace(elements, -speed * sinTrue, speed * (e + cosTrue)),
  }
}

/** A vector in the plane of the orbit (first component towards periapsis) turned into space. */
function toSpace(elements: SpatialElements, x: number, y: number): Vector {
  sinCosInto(elements.argumentOfPeriapsisRad, turn)
  const alongNode = turn[1]! * x - turn[0]! * y
  const acrossNode = turn[0]! * x + turn[1]! * y
  sinCosInto(elements.inclinationRad, turn)
  const level = turn[1]! * acrossNode
  const z = turn[0]! * acrossNode
  sinCosInto(elements.nodeRad, turn)
  return [turn[1]! * alongNode - turn[0]! * level, turn[0]! * alongNode + turn[1]! * level, z]
}

/**
 * State after a time of undisturbed motion.
 * @param state place and velocity, not parallel.
 * @param gravitationalParameter μ, > 0, length³/time².
 * @param elapsed time, of either sign, in the unit of μ.
 * @returns place and velocity then.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function stateAfter(state: StateVectors, gravitationalParameter: number, elapsed: number): StateVectors {
  const elements = elementsFromState(state, gravitationalParameter)
  const e = elements.eccentricity
  const rate = meanMotion({ periapsisDistance: elements.semiLatusRectum / (1 + e), eccentricity: e, gravitationalParameter })
  const within = elements.trueAnomalyRad > PI ? elements.trueAnomalyRad - TWO_PI : elements.trueAnomalyRad
  const trueAnomalyRad = trueFromMeanRad(meanFromTrueRad(within, e) + rate * elapsed, e)
  return stateFromElements({ ...elements, trueAnomalyRad }, gravitationalParameter)
}
