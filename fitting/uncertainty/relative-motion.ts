/**
 * What the ellipse of a double star says about the motion: its class, the constants of motion, the arc that was observed, and the way
 * back from the sky into the plane of the orbit. Lengths are arcsec, so μ = 4π² a³/P² is in arcsec³ yr⁻².
 * Source: Goldstein 1980, Classical Mechanics, ch. 3; circle test: Lucy & Sweeney 1971, AJ 76, 544 (from memory).
 */
import { apparentPlace } from '../conic/ephemeris'
import { largestDrift, stateFromEccentric } from '../conic/constants'
import { trueFromMeanRad } from '../conic/anomalies'
import { thieleInnesFromCampbell } from '../conic/thiele-innes'
import { solveKeplerInto } from '../conic/kepler'
import { atan2, cos, hypot, PI, RAD, sin, TWO_PI } from '../elementary'
import type { Conic, Constants, Element, FitStatistics } from '../types'
import { isCircleExcluded } from './circle-test'
import { elementOf, type ErrorScale, type Quantity } from './error-scale'
import type { RelativeElements } from './relative-elements'
import type { CarryBack } from './sky-residuals'

/** Below this |cos i| the orbit is seen on edge and a measure cannot be carried back onto it. */
export const EDGE_ON_BELOW = 0.05
const SKY_FRAME = 'north, east, towards the observer; the third component has no known sign without velocities'

/** σ of the node above which node and argument of periastron are not determined apart. */
const UNKNOWN_ANGLE_DEG = 30

/** Covariance of unit variance and the factors to publish. */
export interface Errors {
  covariance: number[][] | null
  scale: ErrorScale
}

/**
 * Class, p and e of a relative orbit.
 * @param elements of the solution.
 * @param errors of the solution.
 * @returns the conic; bound by construction, so no probability of e < 1 is given.
 * Source: Lucy & Sweeney 1971, AJ 76, 544 (from memory), for the circle.
 */
export function relativeConic(elements: RelativeElements, errors: Errors): Conic {
  const eccentricity = elementOf(elements.quantities.eccentricity, errors.covariance, errors.scale)
  const { value: e, sigma } = eccentricity
  const circleExcluded = isCircleExcluded(e, sigma)
  const circle = circleExcluded === null ? '' : circleExcluded ? '; a circle is excluded' : '; a circle is not excluded'
  return {
    class: elements.isCircle ? 'circle' : 'ellipse',
    semiLatusRectum: elementOf(elements.semiLatusRectum, errors.covariance, errors.scale),
    eccentricity,
    probabilityBound: null,
    parabolaExcluded: null,
    circleExcluded,
    statement: `${elements.isCircle ? 'Circle' : 'Ellipse'}, bound by construction${circle}`,
  }
}

/**
 * The combination of ω and Ω that an orbit seen nearly face on still determines.
 * @param elements of the solution.
 * @param errors of the solution.
 * @returns null where ω and Ω are determined apart or there are no errors; else the element by name: longitudeOfPeriastron (ω + Ω) for
 * direct, argumentOfPeriastronMinusNode (ω − Ω) for retrograde motion.
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function combinedAngle(elements: RelativeElements, errors: Errors): { name: string; words: string; element: Element } | null {
  if (errors.covariance === null) return null
  const { sigma } = elementOf(elements.quantities.node, errors.covariance, errors.scale)
  if (sigma !== null && sigma <= UNKNOWN_ANGLE_DEG) return null
  const isDirect = cos(elements.inclinationRad) > 0
  return {
    name: isDirect ? 'longitudeOfPeriastron' : 'argumentOfPeriastronMinusNode',
    words: isDirect ? 'ω + Ω' : 'ω − Ω',
    element: elementOf(isDirect ? elements.sum : elements.difference, errors.covariance, errors.scale),
  }
}

function scaled(factor: number, gradient: ArrayLike<number>, ...more: [number, ArrayLike<number>][]): Float64Array {
  return Float64Array.from({ length: gradient.length }, (_, j) => factor * gradient[j]! + more.reduce((sum, [f, g]) => sum + f * g[j]!, 0))
}

/** μ e P̂ in the frame of the sky, with gradients through μ, e, i, Ω, ω. */
function laplaceRungeLenz(elements: RelativeElements, mu: number, dLnMu: Float64Array): Quantity[] {
  const { eccentricity: e, inclinationRad: i, nodeRad, argumentRad, gradients } = elements
  const [cw, sw, cn, sn, ci, si] = [cos(argumentRad), sin(argumentRad), cos(nodeRad), sin(nodeRad), cos(i), sin(i)]
  const direction = [cw * cn - sw * sn * ci, cw * sn + sw * cn * ci, sw * si]
  const byInclination = [sw * sn * si, -sw * cn * si, sw * ci]
  const byNode = [-direction[1]!, direction[0]!, 0]
  const byArgument = [-sw * cn - cw * sn * ci, -sw * sn + cw * cn * ci, cw * si]
  return direction.map((part, k) => ({
    value: mu * e * part,
    gradient: scaled(mu * e * part, dLnMu, [mu * part, gradients.e], [mu * e * byInclination[k]!, gradients.i],
      [mu * e * byNode[k]!, gradients.node], [mu * e * byArgument[k]!, gradients.argument]),
    unit: 'arcsec³/yr²',
  }))
}

/** States at the measured epochs in the plane of the orbit, for the self-check. */
function driftOver(elements: RelativeElements, mu: number, epochsYr: readonly number[]): number {
  const anomaly = new Float64Array(3)
  const ellipse = { semiMajorAxis: elements.semiMajorAxisArcsec, eccentricity: elements.eccentricity, gravitationalParameter: mu }
  const states = epochsYr.map((epochYr) => {
    solveKeplerInto((TWO_PI * (epochYr - elements.quantities.periastronTime.value)) / elements.periodYr, elements.eccentricity, anomaly)
    return stateFromEccentric(ellipse, anomaly[1]!, anomaly[2]!)
  })
  return largestDrift(states, mu)
}

/**
 * Constants of motion per unit mass, in arcsec and years.
 * @param elements of the solution.
 * @param errors of the solution.
 * @param epochsYr measured epochs, for the self-check.
 * @returns ε, h and the Laplace–Runge–Lenz vector with errors, and their largest drift.
 * Source: Goldstein 1980, Classical Mechanics, ch. 3.
 */
export function relativeConstants(elements: RelativeElements, errors: Errors, epochsYr: readonly number[]): Constants {
  const { semiMajorAxisArcsec: a, periodYr, eccentricity: e, gradients } = elements
  const p = elements.semiLatusRectum
  const mu = (4 * PI * PI * a * a * a) / (periodYr * periodYr)
  const dLnMu = scaled(3, gradients.lnAxis, [-2, gradients.lnPeriod])
  const energy = -mu / (2 * a)
  const momentum = Math.sqrt(mu * p.value)
  const element = (quantity: Quantity) => elementOf(quantity, errors.covariance, errors.scale)
  return {
    gravitationalParameter: element({ value: mu, gradient: scaled(mu, dLnMu), unit: 'arcsec³/yr²' }),
    specificEnergy: element({ value: energy, gradient: scaled(energy, dLnMu, [-energy, gradients.lnAxis]), unit: 'arcsec²/yr²' }),
    angularMomentum: element({
      value: momentum, gradient: scaled(momentum / 2, dLnMu, [momentum / (2 * p.value), p.gradient]), unit: 'arcsec²/yr',
    }),
    laplaceRungeLenz: {
      frame: SKY_FRAME,
      components: laplaceRungeLenz(elements, mu, dLnMu).map(element),
      magnitude: element({ value: mu * e, gradient: scaled(mu * e, dLnMu, [mu, gradients.e]), unit: 'arcsec³/yr²' }),
    },
    largestDrift: driftOver(elements, mu, epochsYr),
  }
}

/**
 * The way from a place on the sky into the plane of the orbit.
 * @param elements of the solution.
 * @returns a function of north and east, arcsec, giving true anomaly and radius; null for every place where |cos i| < 0.05.
 * Source: inverse of x = A X + F Y, y = B X + G Y; Heintz 1978, Double Stars, ch. 4.
 */
export function carryBackOf(elements: RelativeElements): CarryBack {
  const { semiMajorAxisArcsec, inclinationRad, nodeRad, argumentRad: argumentOfPeriastronRad } = elements
  if (Math.abs(cos(inclinationRad)) < EDGE_ON_BELOW) return () => null
  const { a, b, f, g } = thieleInnesFromCampbell({ semiMajorAxisArcsec, inclinationRad, nodeRad, argumentOfPeriastronRad })
  const determinant = a * g - b * f
  return (north, east) => {
    const X = (g * north - f * east) / determinant
    const Y = (a * east - b * north) / determinant
    return { trueAnomalyDeg: atan2(Y, X) * RAD, radius: hypot(X, Y) * semiMajorAxisArcsec }
  }
}

/**
 * The arc that used measures cover.
 * @param elements of the solution.
 * @param firstEpochYr first used epoch, Julian year.
 * @param lastEpochYr last used epoch.
 * @returns span in periods, and the angles swept in true anomaly and on the sky, at most 360°.
 */
export function relativeArc(elements: RelativeElements, firstEpochYr: number, lastEpochYr: number): FitStatistics['arc'] {
  const { periodYr, eccentricity, inclinationRad, semiMajorAxisArcsec, nodeRad, argumentRad } = elements
  const turns = (lastEpochYr - firstEpochYr) / periodYr
  const periastronTimeYr = elements.quantities.periastronTime.value
  const trueAt = (epochYr: number) => trueFromMeanRad((TWO_PI * (epochYr - periastronTimeYr)) / periodYr, eccentricity)
  const swept = (trueAt(lastEpochYr) - trueAt(firstEpochYr)) * RAD
  const orbit = { periodYr, periastronTimeYr, eccentricity, semiMajorAxisArcsec, inclinationRad, nodeRad, argumentOfPeriastronRad: argumentRad }
  const theta = (epochYr: number) => apparentPlace(orbit, epochYr).positionAngleRad * RAD
  const turned = (cos(inclinationRad) < 0 ? -1 : 1) * (theta(lastEpochYr) - theta(firstEpochYr))
  return {
    firstEpochYr, lastEpochYr, turns,
    trueAnomalyCoveredDeg: Math.min(360, swept),
    positionAngleCoveredDeg: turns >= 1 || swept >= 360 ? 360 : turned - 360 * Math.floor(turned / 360),
  }
}
