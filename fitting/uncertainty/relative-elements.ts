/**
 * Campbell elements of a relative orbit with their gradients by the regular parameters (ln P, u, v, A₁, B₁, F₁, G₁).
 *   S = atan2(B₁ − F₁, A₁ + G₁),  D = atan2(−B₁ − F₁, A₁ − G₁),  a(1 ± cos i) = R± = hypot(A₁ ± G₁, B₁ ∓ F₁)
 *   Ω = (S − D)/2,  ω = ϖ + (S + D)/2,  a = (R₊ + R₋)/2,  tan²(i/2) = R₋/R₊,  T = t_ref + P ϖ/2π + j P
 * A₁ … G₁ are turned by ϖ against the usual constants, so S and D carry no ϖ and nothing is singular at e = 0 but ϖ itself.
 * Without velocities Ω and ω may both turn by 180°: 0 ≤ Ω < 180° is given.
 * Source: Heintz 1978, Double Stars, ch. 4; the turned constants are ours.
 */
import { atan2, exp, hypot, PI, RAD, TWO_PI } from '../elementary'
import { withFirstNode, withinTurn } from '../conic/thiele-innes'
import { shapeOf } from '../models/relative-kepler'
import { quadraticForm, type Quantity } from './error-scale'

const P = 7
/** Below this eccentricity the orbit is a circle to rounding: ω = 0 and T the passage of the node. */
const CIRCULAR_BELOW = 1e-8

/** Everything derived from one solution; angles in rad inside, in degrees in the quantities. */
export interface RelativeElements {
  periodYr: number
  eccentricity: number
  semiMajorAxisArcsec: number
  inclinationRad: number
  nodeRad: number
  argumentRad: number
  isCircle: boolean
  /** By element name, in the order of the covariance matrix. */
  quantities: Record<(typeof ELEMENT_NAMES)[number], Quantity>
  /** Passage after the last measure. */
  nextPeriastron: Quantity
  semiLatusRectum: Quantity
  /** ω + Ω and ω − Ω, deg, mod 360. */
  sum: Quantity
  difference: Quantity
  /** Gradients of ln P, e, ln a, i, Ω, ω (rad) for what is derived further. */
  gradients: { lnPeriod: Float64Array; e: Float64Array; lnAxis: Float64Array; i: Float64Array; node: Float64Array; argument: Float64Array }
}

/** Names of the published elements, in the order of the covariance matrix. */
export const ELEMENT_NAMES = [
  'period', 'periastronTime', 'eccentricity', 'semiMajorAxis', 'inclination', 'node', 'argumentOfPeriastron',
] as const

/** Σ factorᵢ gᵢ. */
function combine(...terms: [number, ArrayLike<number>][]): Float64Array {
  const out = new Float64Array(P)
  for (const [factor, gradient] of terms) for (let j = 0; j < P; j++) out[j] = out[j]! + factor * gradient[j]!
  return out
}

function unitVector(index: number, value = 1): Float64Array {
  const out = new Float64Array(P)
  out[index] = value
  return out
}

/** S, D, R₊, R₋ with their gradients. */
function turnedConstants(values: ArrayLike<number>) {
  const A = values[3]!
  const B = values[4]!
  const F = values[5]!
  const G = values[6]!
  const plus = hypot(A + G, B - F)
  const minus = hypot(A - G, B + F)
  const [cp, sp] = plus > 0 ? [(A + G) / plus, (B - F) / plus] : [0, 0]
  const [cm, sm] = minus > 0 ? [(A - G) / minus, (B + F) / minus] : [0, 0]
  return {
    plus, minus,
    S: plus > 0 ? atan2(B - F, A + G) : 0,
    D: minus > 0 ? atan2(-B - F, A - G) : 0,
    dPlus: Float64Array.of(0, 0, 0, cp, sp, -sp, cp),
    dMinus: Float64Array.of(0, 0, 0, cm, sm, sm, -cm),
    dS: Float64Array.of(0, 0, 0, -sp / plus, cp / plus, -cp / plus, -sp / plus),
    dD: Float64Array.of(0, 0, 0, sm / minus, -cm / minus, -cm / minus, -sm / minus),
  }
}

/** ϖ and e with gradients. */
function shapeGradients(values: ArrayLike<number>) {
  const u = values[1]!
  const v = values[2]!
  const s2 = u * u + v * v
  const s = Math.sqrt(s2)
  const { eccentricity, varpiRad } = shapeOf(u, v)
  const slope = s > 0 ? (1 - eccentricity * eccentricity) / s : 1
  return {
    eccentricity, varpiRad,
    dE: s > 0 ? Float64Array.of(0, u * slope, v * slope, 0, 0, 0, 0) : Float64Array.of(0, 1, 0, 0, 0, 0, 0),
    dVarpi: Float64Array.of(0, -v / s2, u / s2, 0, 0, 0, 0),
  }
}

/** T = t_ref + P (ϖ/2π + turns) with its gradient. */
function passage(referenceEpochYr: number, periodYr: number, phase: number, dVarpi: Float64Array): Quantity {
  return {
    value: referenceEpochYr + periodYr * phase,
    gradient: combine([periodYr * phase, unitVector(0)], [periodYr / TWO_PI, dVarpi]),
    unit: 'Julian year',
  }
}

/** The whole number of turns that makes σ_T smallest: −Cov(T, P)/Var(P), to the nearest. */
function bestTurns(covariance: number[][] | null, first: Quantity, periodYr: number): number {
  if (covariance === null) return 0
  const dPeriod = unitVector(0, periodYr)
  const turns = Math.round(-quadraticForm(covariance, first.gradient, dPeriod) / quadraticForm(covariance, dPeriod))
  return Math.abs(turns) < 1e6 ? turns + 0 : 0
}

export interface RelativeSolution {
  /** Regular parameters. */
  values: ArrayLike<number>
  covariance: number[][] | null
  referenceEpochYr: number
  lastEpochYr: number
}

/**
 * Campbell elements with gradients.
 * @param solution regular parameters, their covariance (unit variance), reference and last epoch (Julian years).
 * @returns elements; gradients are infinite where an element is not determined (node at i = 0, periastron of a circle).
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function relativeElements(solution: RelativeSolution): RelativeElements {
  const { values, covariance, referenceEpochYr, lastEpochYr } = solution
  const periodYr = exp(values[0]!)
  const turned = turnedConstants(values)
  const { plus, minus } = turned
  const shape = shapeGradients(values)
  const e = shape.eccentricity
  const isCircle = e < CIRCULAR_BELOW
  const a = (plus + minus) / 2
  const inclinationRad = 2 * atan2(Math.sqrt(minus), Math.sqrt(plus))
  const half = (turned.S + turned.D) / 2
  const reduced = withFirstNode((turned.S - turned.D) / 2, isCircle ? 0 : shape.varpiRad + half)
  const isOtherNode = isCircle && reduced.argumentOfPeriastronRad > 0
  const varpi = isCircle ? (isOtherNode ? PI : 0) - half : shape.varpiRad
  const dVarpi = isCircle ? combine([-0.5, turned.dS], [-0.5, turned.dD]) : shape.dVarpi
  const nodeRad = reduced.nodeRad
  const argumentRad = isCircle ? 0 : reduced.argumentOfPeriastronRad
  const gradients = {
    lnPeriod: unitVector(0),
    e: shape.dE,
    lnAxis: combine([0.5 / a, turned.dPlus], [0.5 / a, turned.dMinus]),
    i: combine([plus / ((plus + minus) * Math.sqrt(plus * minus)), turned.dMinus], [-minus / ((plus + minus) * Math.sqrt(plus * minus)), turned.dPlus]),
    node: combine([0.5, turned.dS], [-0.5, turned.dD]),
    argument: isCircle ? new Float64Array(P) : combine([1, shape.dVarpi], [0.5, turned.dS], [0.5, turned.dD]),
  }
  const first = passage(referenceEpochYr, periodYr, varpi / TWO_PI, dVarpi)
  const at = (turns: number) => passage(referenceEpochYr, periodYr, varpi / TWO_PI + turns, dVarpi)
  const nextTurns = Math.floor((lastEpochYr - first.value) / periodYr) + 1
  const inDegrees = (value: number, gradient: Float64Array): Quantity => ({ value: value * RAD, gradient: combine([RAD, gradient]), unit: 'deg' })
  return {
    periodYr, eccentricity: e, semiMajorAxisArcsec: a, inclinationRad, nodeRad, argumentRad, isCircle, gradients,
    quantities: {
      period: { value: periodYr, gradient: unitVector(0, periodYr), unit: 'yr' },
      periastronTime: at(bestTurns(covariance, first, periodYr)),
      eccentricity: { value: e, gradient: shape.dE, unit: '' },
      semiMajorAxis: { value: a, gradient: combine([a, gradients.lnAxis]), unit: 'arcsec' },
      inclination: inDegrees(inclinationRad, gradients.i),
      node: inDegrees(nodeRad, gradients.node),
      argumentOfPeriastron: inDegrees(argumentRad, gradients.argument),
    },
    nextPeriastron: at(nextTurns),
    semiLatusRectum: { value: a * (1 - e) * (1 + e), gradient: combine([a * (1 - e) * (1 + e), gradients.lnAxis], [-2 * a * e, shape.dE]), unit: 'arcsec' },
    sum: inDegrees(withinTurn(nodeRad + argumentRad), combine([1, dVarpi], [1, turned.dS])),
    difference: inDegrees(withinTurn(argumentRad - nodeRad), combine([1, dVarpi], [1, turned.dD])),
  }
}

