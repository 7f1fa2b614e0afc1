/**
 * What times add to a conic in its plane: period, time of periapsis, constants of motion, and the check of the law of areas. All with
 * gradients by (p, k, h, H, φᵣ). The passage of periapsis is the one nearest to the reference epoch.
 *   P = 2π p²/(|H| (1 − e²)^(3/2)),  μ = H²/p,  ε = −μ (1 − e²)/(2p),  A = μ (k, h)
 * Law of areas: with H (1 + γ (t − tᵣ)) in place of H, γ from one linear step at the solution; by Kepler's second law it is 0.
 * Source: Goldstein 1980, Classical Mechanics, 2nd ed., ch. 3; the check by γ is ours.
 */
import { largestDrift } from '../conic/constants'
import { meanFromTrueRad, meanMotion } from '../conic/anomalies'
import type { StateVectors } from '../conic/state'
import { atan2, cos, hypot, sin, TWO_PI } from '../elementary'
import { PlaneMotion, planeRowBuffer, planeRowsInto } from '../models/plane-motion'
import type { PlanePoint } from '../models/plane-measure'
import { wrapToHalfTurn } from '../models/relative-kepler'
import { triangularFactor } from '../solve/triangular-factor'
import type { Constants, FitStatistics } from '../types'
import { elementOf, type ErrorScale, type Quantity } from './error-scale'

const P = 5
const FRAME = 'toward φ = 0 and φ = 90° in the plane of the orbit'

/** Yr; null where the motion is not bound. */
function periodOf(values: ArrayLike<number>): Quantity | null {
  const [p, k, h, areal] = [values[0]!, values[1]!, values[2]!, values[3]!]
  const rest = 1 - k * k - h * h
  if (!(rest > 0)) return null
  const period = (TWO_PI * p * p) / (Math.abs(areal) * rest * Math.sqrt(rest))
  return { value: period, gradient: [(2 * period) / p, (3 * period * k) / rest, (3 * period * h) / rest, -period / areal, 0], unit: 'yr' }
}

/** T with its gradient from that of the direction at T: φ(T) = φ₀, φ̇ = H/q². */
function passageOf(values: ArrayLike<number>, motion: PlaneMotion): Quantity {
  const [p, k, h, areal, reference] = [values[0]!, values[1]!, values[2]!, values[3]!, values[4]!]
  const e = hypot(k, h)
  const phi0 = atan2(h, k)
  const q = p / (1 + e)
  const mean = meanFromTrueRad((areal > 0 ? 1 : -1) * wrapToHalfTurn(reference - phi0), e)
  const value = motion.referenceEpochYr - mean / meanMotion({ periapsisDistance: q, eccentricity: e, gravitationalParameter: (areal * areal) / p })
  const gradient = new Float64Array(P).fill(Infinity)
  if (e > 0 && motion.prepare(values) && motion.at(value, true)) {
    const rate = areal / (q * q)
    const [c, s] = [k / e, h / e]
    const byPhi0 = [0, -s / e, c / e, 0, 0]
    for (let j = 0; j < P; j++) gradient[j] = (byPhi0[j]! - (c * motion.byY[j]! - s * motion.byX[j]!) / q) / rate
  }
  return { value, gradient, unit: 'Julian year' }
}

/**
 * Period and time of periapsis.
 * @param values (p, k, h, H, φᵣ).
 * @param referenceEpochYr Julian year.
 * @returns the quantities; no period where the motion is not bound.
 * Source: Goldstein 1980, Classical Mechanics, 2nd ed., ch. 3.
 */
export function planeTimeQuantities(values: ArrayLike<number>, referenceEpochYr: number): Record<string, Quantity> {
  const period = periodOf(values)
  return { ...(period === null ? {} : { period }), periapsisTime: passageOf(values, new PlaneMotion(referenceEpochYr)) }
}

export interface PlaneMotionContext {
  points: readonly PlanePoint[]
  values: ArrayLike<number>
  referenceEpochYr: number
  covariance: number[][] | null
  scale: ErrorScale
  unit: string
  diameterScale: number | null
}

function statesOf({ points, values, referenceEpochYr }: PlaneMotionContext, mu: number): StateVectors[] {
  const motion = new PlaneMotion(referenceEpochYr)
  motion.prepare(values)
  const root = Math.sqrt(mu)
  return points.flatMap((point) => {
    if (point.epochYr === null || !motion.at(point.epochYr, false)) return []
    const { state } = motion
    return [{ place: [state[0]!, state[1]!, 0], velocity: [state[3]! * root, state[4]! * root, 0] }] as StateVectors[]
  })
}

/**
 * Constants of motion per unit mass, in the unit of r and years.
 * @param context solution and errors.
 * @returns ε, h (< 0 where φ falls with time), the Laplace–Runge–Lenz vector in the plane, and their largest drift.
 * Source: Goldstein 1980, Classical Mechanics, 2nd ed., ch. 3.
 */
export function planeConstants(context: PlaneMotionContext): Constants {
  const { values, covariance, scale, unit } = context
  const [p, k, h, areal] = [values[0]!, values[1]!, values[2]!, values[3]!]
  const e = hypot(k, h)
  const mu = (areal * areal) / p
  const [muByP, muByH] = [-mu / p, (2 * mu) / areal]
  const rest = 1 - k * k - h * h
  const element = (value: number, gradient: number[], unitOf: string) => elementOf({ value, gradient, unit: unitOf }, covariance, scale)
  const [cubed, squared] = [`(${unit})³/yr²`, `(${unit})²/yr²`]
  return {
    gravitationalParameter: element(mu, [muByP, 0, 0, muByH, 0], cubed),
    specificEnergy: element((-mu * rest) / (2 * p), [(mu * rest) / (p * p), (mu * k) / p, (mu * h) / p, (-muByH * rest) / (2 * p), 0], squared),
    angularMomentum: element(areal, [0, 0, 0, 1, 0], `(${unit})²/yr`),
    laplaceRungeLenz: {
      frame: FRAME,
      components: [element(mu * k, [muByP * k, mu, 0, muByH * k, 0], cubed), element(mu * h, [muByP * h, 0, mu, muByH * h, 0], cubed)],
      magnitude: element(mu * e, [muByP * e, e > 0 ? (mu * k) / e : mu, e > 0 ? (mu * h) / e : 0, muByH * e, 0], cubed),
    },
    largestDrift: largestDrift(statesOf(context, mu), mu),
  }
}

/**
 * Does the areal velocity stay constant?
 * @param context solution and errors; points are those used.
 * @returns γ, the relative change of ½ r² φ̇ a year, with its published error; nothing where it is not determined.
 * Source: Kepler 1609, Astronomia nova; the test is ours.
 */
export function arealLawOf({ points, values, referenceEpochYr, scale, diameterScale }: PlaneMotionContext): Pick<FitStatistics, 'arealLaw'> {
  const motion = new PlaneMotion(referenceEpochYr)
  const buffer = planeRowBuffer()
  if (scale.published === null || !motion.prepare(values)) return {}
  const lines: number[][] = []
  for (const point of points) {
    if (!planeRowsInto(point, motion, values, diameterScale ?? 1, buffer)) return {}
    const elapsed = (point.epochYr ?? referenceEpochYr) - referenceEpochYr
    for (let i = 0; i < buffer.count; i++) lines.push([...buffer.gradients.subarray(i * P, (i + 1) * P), (buffer.byTime[i]! * elapsed * elapsed) / 2, buffer.values[i]!])
  }
  if (lines.length <= P + 1) return {}
  const columns = P + 1
  const system = { rows: lines.length, columns, jacobian: Float64Array.from(lines.flatMap((line) => line.slice(0, columns))), residuals: Float64Array.from(lines, (line) => line[columns]!) }
  const { factor, rotated } = triangularFactor(system, new Float64Array(columns).fill(1))
  const last = factor[columns * columns - 1]!
  const [value, sigma] = [-rotated[P]! / last, scale.published / Math.abs(last)]
  return sigma > 0 && sigma < Infinity ? { arealLaw: { changePerYr: value + 0, sigma } } : {}
}

/** x and y at an epoch, and the way along the direction measured; null where they cannot be computed. */
export function planePlaceAt(values: ArrayLike<number>, referenceEpochYr: number, point: PlanePoint): { r: number; phiRad: number; along: number; across: number } | null {
  const motion = new PlaneMotion(referenceEpochYr)
  if (point.epochYr === null || !motion.prepare(values) || !motion.at(point.epochYr, false)) return null
  const [x, y] = [motion.state[0]!, motion.state[1]!]
  const [c, s] = [cos(point.phiRad), sin(point.phiRad)]
  return { r: hypot(x, y), phiRad: atan2(y, x), along: c * x + s * y, across: c * y - s * x }
}
