/**
 * Where a comet or minor planet stands, seen from the Earth's centre: astrometric place on the axes of the ICRS, distances, phase,
 * elongation, rates, and the ellipse of error on the sky.
 * Source: definition of the quantities; propagation of errors, Bevington & Robinson (2003), 3.2.
 */
import { cross, dot, lengthOf, type Vector } from '../conic/state'
import { withinTurn } from '../conic/thiele-innes'
import { earthHeliocentric, sunBarycentricVelocity } from '../earth'
import { asin, atan2, RAD } from '../elementary'
import { orbitOfState, stateOfValues } from '../models/equatorial-orbit'
import { tangentsOf } from '../models/sight-frame'
import { emptyLineOfSight, lineOfSightInto, lineRate, roughLightTime, type LineOfSight } from '../models/line-of-sight'
import { ARCSEC_RAD } from '../models/sighting'
import type { FitState, Prediction } from '../types'
import { quadraticForm } from '../uncertainty/error-scale'

const MINUTES_PER_DAY = 1440

const vectorOf = (a: ArrayLike<number>, from = 0): Vector => [a[from]!, a[from + 1]!, a[from + 2]!]
const angleBetweenDeg = (a: Vector, b: Vector) => atan2(lengthOf(cross(a, b)), dot(a, b)) * RAD

interface Gradients {
  east: Float64Array
  north: Float64Array
  distance: Float64Array
}

/** Derivatives of the direction (rad) and of the distance (au) by the parameters. */
function gradientsOf(found: LineOfSight, byParameter: Float64Array, p: number): Gradients {
  const u = vectorOf(found.line).map((part) => part / found.distance) as unknown as Vector
  const { east, north } = tangentsOf(u)
  const along = (axis: Vector, scale: number) => Float64Array.from({ length: p }, (_, j) => {
    let sum = 0
    for (let k = 0; k < 3; k++) for (let i = 0; i < 6; i++) sum += axis[k]! * found.partials[6 * k + i]! * byParameter[i * p + j]!
    return sum * scale
  })
  return { east: along(east, 1 / found.distance), north: along(north, 1 / found.distance), distance: along(u, 1) }
}

interface Ellipse {
  major: number
  minor: number
  positionAngleDeg: number
}

/** Axes of the error ellipse, in the unit of the σ, and the position angle of the major one. */
function ellipseOf(ee: number, en: number, nn: number): Ellipse {
  const mean = 0.5 * (ee + nn)
  const half = Math.sqrt(0.25 * (ee - nn) * (ee - nn) + en * en)
  return { major: Math.sqrt(mean + half), minor: Math.sqrt(Math.max(0, mean - half)), positionAngleDeg: withinTurn(atan2(2 * en, nn - ee)) * RAD / 2 }
}

function errorsOf(covariance: number[][] | null, gradients: Gradients, level: number): Pick<Prediction, 'sigmas' | 'correlation'> & { ellipse: Ellipse | null } {
  const none = { sigmas: { raDeg: null, decDeg: null, distanceAu: null }, correlation: null, ellipse: null }
  if (covariance === null) return none
  const form = (g: Float64Array, h: Float64Array) => quadraticForm(covariance, g, h)
  const [ee, en, nn, dd] = [form(gradients.east, gradients.east), form(gradients.east, gradients.north), form(gradients.north, gradients.north), form(gradients.distance, gradients.distance)]
  if (!(ee >= 0 && nn >= 0 && dd >= 0 && ee + nn + dd < Infinity)) return none
  const product = Math.sqrt(ee) * Math.sqrt(nn)
  return {
    sigmas: { raDeg: level > 1e-9 ? Math.sqrt(ee) * RAD / level : null, decDeg: Math.sqrt(nn) * RAD, distanceAu: Math.sqrt(dd) },
    correlation: product > 0 ? Math.max(-1, Math.min(1, en / product)) : null,
    ellipse: ellipseOf(ee, en, nn),
  }
}

interface Seen {
  found: LineOfSight
  earth: Float64Array
  sunVelocity: Float64Array
}

function valuesOf({ found, earth, sunVelocity }: Seen): Record<string, number> {
  const [line, body, observer] = [vectorOf(found.line), vectorOf(found.state), vectorOf(earth)]
  const u = line.map((part) => part / found.distance) as unknown as Vector
  const { east, north } = tangentsOf(u)
  const change = lineRate(sunVelocity, found, earth.subarray(3))
  const rate = (axis: Vector) => dot(change, axis) / found.distance / ARCSEC_RAD / MINUTES_PER_DAY
  const [raRate, decRate] = [rate(east), rate(north)]
  return {
    raDeg: withinTurn(atan2(u[1], u[0])) * RAD,
    decDeg: asin(Math.max(-1, Math.min(1, u[2]))) * RAD,
    distanceAu: found.distance, sunDistanceAu: lengthOf(body),
    phaseAngleDeg: angleBetweenDeg(body, line),
    elongationDeg: angleBetweenDeg([-observer[0], -observer[1], -observer[2]], line),
    raCosDecRateArcsecPerMin: raRate, decRateArcsecPerMin: decRate,
    motionArcsecPerMin: Math.sqrt(raRate * raRate + decRate * decRate),
    motionPositionAngleDeg: withinTurn(atan2(raRate, decRate)) * RAD,
  }
}

/** What `begun` gives: the line of sight from the Earth's centre at a date. */
interface Begun {
  byParameter: Float64Array
  parameters: number
  /** null where the motion cannot be followed. */
  seenAt: (jdTt: number) => Seen | null
}

function begun(state: FitState): Begun {
  const orbit = orbitOfState(state)
  const { parameters } = orbit.map
  const start = new Float64Array(6)
  const byParameter = new Float64Array(6 * parameters)
  orbit.map.stateInto(state.values, start, byParameter)
  const isBegun = orbit.motion.begin(stateOfValues(orbit, state.values), true)
  const [earth, sunVelocity, found] = [new Float64Array(6), new Float64Array(3), emptyLineOfSight()]
  return {
    byParameter, parameters,
    seenAt(jdTt) {
      earthHeliocentric(jdTt, earth)
      sunBarycentricVelocity(jdTt, sunVelocity)
      const sight = { jdTt, observer: earth.subarray(0, 3), sunVelocity }
      return isBegun && lineOfSightInto(sight, orbit.motion, roughLightTime(sight, start), found, true) ? { found, earth, sunVelocity } : null
    },
  }
}

/**
 * Derivatives of the direction by the fitted parameters.
 * @param state of a result of the kind equatorial.
 * @returns a function of JD of TT: derivatives of α cos δ and δ (rad) and of the distance (au); null where the motion cannot be followed.
 */
export function skyGradientsAt(state: FitState): (jdTt: number) => Gradients | null {
  const { seenAt, byParameter, parameters } = begun(state)
  return (jdTt) => {
    const seen = seenAt(jdTt)
    return seen && gradientsOf(seen.found, byParameter, parameters)
  }
}

/**
 * Places at dates.
 * @param state of a result of the kind equatorial.
 * @param at JD of TT, finite.
 * @returns one prediction each; empty values where the motion cannot be followed. `sigmas` has σ of raDeg (in right ascension itself), decDeg
 * and distanceAu, null for the rest; `correlation` is that of α cos δ and δ; values errorMajorArcsec, errorMinorArcsec and
 * errorPositionAngleDeg give the ellipse of one standard error where there is a covariance.
 * Source: Bevington & Robinson (2003), 3.2.
 */
export function predictEquatorial(state: FitState, at: readonly number[]): Prediction[] {
  const { seenAt, byParameter, parameters } = begun(state)
  return at.map((jdTt) => {
    const seen = seenAt(jdTt)
    if (seen === null) return { at: jdTt, values: {}, sigmas: {}, correlation: null }
    const { found } = seen
    const values = valuesOf(seen)
    const level = Math.sqrt(found.line[0]! * found.line[0]! + found.line[1]! * found.line[1]!) / found.distance
    const { ellipse, sigmas, correlation } = errorsOf(state.covariance, gradientsOf(found, byParameter, parameters), level)
    if (ellipse !== null) {
      values.errorMajorArcsec = ellipse.major / ARCSEC_RAD
      values.errorMinorArcsec = ellipse.minor / ARCSEC_RAD
      values.errorPositionAngleDeg = ellipse.positionAngleDeg
    }
    const unknown = Object.fromEntries(Object.keys(values).map((key) => [key, null]))
    return { at: jdTt, values, sigmas: { ...unknown, ...sigmas }, correlation }
  })
}
