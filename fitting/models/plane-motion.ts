/**
 * Motion along a conic in its own plane, of any eccentricity and of either sense, by time.
 *   values = (p, k, h, H, φᵣ): r(φ) = p/(1 + k cos φ + h sin φ), H = r² φ̇ the areal constant (H < 0 where φ falls with time),
 *   φᵣ the direction at the reference epoch; μ = H²/p.
 * In units of μ = 1 the state at the reference epoch is x = r cos φᵣ, y = r sin φᵣ, ẋ = ∓(h + sin φᵣ)/√p, ẏ = ±(k + cos φᵣ)/√p, and the
 * time since then |H| Δt/√p; universal variables carry it on. Nothing is singular at e = 0 or e = 1.
 * A measure with a time gives two rows: along its direction (or its diameter) and across, both with the error of r, because a direction
 * states no error of its own. One without gives the row of plane.ts.
 * Source: Battin 1999, An Introduction to the Mathematics and Methods of Astrodynamics, 4.5; the parameters are ours.
 */
import { moveInto } from '../conic/universal'
import { cos, sin } from '../elementary'
import type { LeastSquaresProblem } from '../solve/least-squares-problem'
import type { PlanePoint } from './plane-measure'

/** Names of the regular parameters, in order; the first three are those of a conic without times. */
export const PLANE_MOTION_NAMES = ['semiLatusRectum', 'k', 'h', 'arealConstant', 'referenceDirection'] as const
const P = PLANE_MOTION_NAMES.length
const SMALLEST_DENOMINATOR = 1e-12

/** Places along one conic, with their derivatives by the five parameters. */
export class PlaneMotion {
  /** Place and velocity in units of μ = 1: x, y, 0, ẋ, ẏ, 0. */
  readonly state = new Float64Array(6)
  readonly byX = new Float64Array(P)
  readonly byY = new Float64Array(P)
  /** Derivatives of the place by the time, a year. */
  rateX = 0
  rateY = 0
  private readonly start = new Float64Array(6)
  /** ∂(x, y, ẋ, ẏ) of the start by (p, k, h, H, φᵣ), row-major. */
  private readonly startBy = new Float64Array(4 * P)
  private readonly partials = new Float64Array(36)
  private semiLatusRectum = 1
  private arealConstant = 1

  /** @param referenceEpochYr Julian year. */
  constructor(readonly referenceEpochYr: number) {}

  /** Takes parameters; false where they are no conic that reaches φᵣ. */
  prepare(values: ArrayLike<number>): boolean {
    const [p, k, h, areal, direction] = [values[0]!, values[1]!, values[2]!, values[3]!, values[4]!]
    const [c, s] = [cos(direction), sin(direction)]
    const denominator = 1 + k * c + h * s
    if (!(p > 0 && denominator > SMALLEST_DENOMINATOR && areal !== 0 && areal - areal === 0)) return false
    this.semiLatusRectum = p
    this.arealConstant = areal
    const r = p / denominator
    const speed = (areal > 0 ? 1 : -1) / Math.sqrt(p)
    const { start, startBy } = this
    start.set([r * c, r * s, 0, -speed * (h + s), speed * (k + c), 0])
    const byDirection = (r * (k * s - h * c)) / denominator
    startBy.set([
      c / denominator, (-r * c * c) / denominator, (-r * s * c) / denominator, 0, byDirection * c - r * s,
      s / denominator, (-r * c * s) / denominator, (-r * s * s) / denominator, 0, byDirection * s + r * c,
      -start[3]! / (2 * p), 0, -speed, 0, -speed * c,
      -start[4]! / (2 * p), speed, 0, 0, -speed * s,
    ])
    return true
  }

  /** Moves to an epoch, Julian year; false where that cannot be computed. */
  at(epochYr: number, withPartials: boolean): boolean {
    const { state, start, startBy, partials, semiLatusRectum: p, arealConstant: areal } = this
    const root = Math.sqrt(p)
    const elapsedYr = epochYr - this.referenceEpochYr
    const elapsed = (Math.abs(areal) * elapsedYr) / root
    if (!moveInto(start, 1, elapsed, state, withPartials ? partials : undefined)) return false
    this.rateX = (state[3]! * Math.abs(areal)) / root
    this.rateY = (state[4]! * Math.abs(areal)) / root
    if (!withPartials) return true
    for (let j = 0; j < P; j++) {
      const [dx, dy, dvx, dvy] = [startBy[j]!, startBy[P + j]!, startBy[2 * P + j]!, startBy[3 * P + j]!]
      const byElapsed = j === 0 ? -elapsed / (2 * p) : j === 3 ? elapsed / areal : 0
      this.byX[j] = partials[0]! * dx + partials[1]! * dy + partials[3]! * dvx + partials[4]! * dvy + state[3]! * byElapsed
      this.byY[j] = partials[6]! * dx + partials[7]! * dy + partials[9]! * dvx + partials[10]! * dvy + state[4]! * byElapsed
    }
    return true
  }
}

/** One or two whitened rows of a measure with their gradients by the five parameters. */
export interface PlaneRows {
  count: 1 | 2
  values: Float64Array
  /** Two rows of five, row-major. */
  gradients: Float64Array
  /** Derivatives of the rows by the time, a year; 0 without a time. */
  byTime: Float64Array
}

export function planeRowBuffer(): PlaneRows {
  return { count: 1, values: new Float64Array(2), gradients: new Float64Array(2 * P), byTime: new Float64Array(2) }
}

/** Standard error of r of a measure, in the unit of r. */
export function radialSigma(point: PlanePoint): number {
  return point.coordinate === 'r' ? point.sigma : (point.r * point.sigma) / point.value
}

/** The row of a measure without a time, as in plane.ts. */
function untimedRow(point: PlanePoint, values: ArrayLike<number>, scale: number, out: PlaneRows): boolean {
  const p = values[0]!
  const [c, s] = [cos(point.phiRad), sin(point.phiRad)]
  const denominator = 1 + values[1]! * c + values[2]! * s
  if (!(denominator > SMALLEST_DENOMINATOR)) return false
  const isDiameter = point.coordinate === 'diameterArcmin'
  const whitening = Math.sqrt(point.weight) / point.sigma
  const model = isDiameter ? (scale * denominator) / p : p / denominator
  const byShape = (isDiameter ? scale / p : -p / (denominator * denominator)) * whitening
  out.count = 1
  out.values[0] = (model - point.value) * whitening
  out.gradients.fill(0)
  out.gradients.set([(isDiameter ? -model / p : 1 / denominator) * whitening, byShape * c, byShape * s])
  out.byTime.fill(0)
  return true
}

/**
 * Rows of one measure.
 * @param point with its error.
 * @param motion with `prepare` done for values.
 * @param values the five parameters.
 * @param scale c of diameters, arcmin × unit of r.
 * @param out takes the rows.
 * @param withPartials whether gradients are wanted.
 * @returns false where the conic is not defined there.
 */
export function planeRowsInto(point: PlanePoint, motion: PlaneMotion, values: ArrayLike<number>, scale: number, out: PlaneRows, withPartials = true): boolean {
  if (point.epochYr === null) return untimedRow(point, values, scale, out)
  if (!motion.at(point.epochYr, withPartials)) return false
  const [x, y] = [motion.state[0]!, motion.state[1]!]
  const [c, s] = [cos(point.phiRad), sin(point.phiRad)]
  const root = Math.sqrt(point.weight)
  const across = root / radialSigma(point)
  out.count = 2
  let [alongX, alongY] = [c * across, s * across]
  out.values[0] = (c * x + s * y - point.r) * across
  if (point.coordinate === 'diameterArcmin') {
    const r = Math.sqrt(x * x + y * y)
    const whitening = root / point.sigma
    out.values[0] = (scale / r - point.value) * whitening
    const byR = (-scale / (r * r * r)) * whitening
    ;[alongX, alongY] = [byR * x, byR * y]
  }
  out.values[1] = (c * y - s * x) * across
  if (!withPartials) return true
  for (let j = 0; j < P; j++) {
    out.gradients[j] = alongX * motion.byX[j]! + alongY * motion.byY[j]!
    out.gradients[P + j] = across * (c * motion.byY[j]! - s * motion.byX[j]!)
  }
  out.byTime[0] = alongX * motion.rateX + alongY * motion.rateY
  out.byTime[1] = across * (c * motion.rateY - s * motion.rateX)
  return true
}

/**
 * Whitened problem of a conic with times, in (p, k, h, H, φᵣ).
 * @param points used measures with errors.
 * @param diameterScale c, where diameters were measured.
 * @param referenceEpochYr Julian year.
 * @returns a problem with analytic Jacobian.
 */
export function planeMotionProblem(points: readonly PlanePoint[], diameterScale: number | null, referenceEpochYr: number): LeastSquaresProblem {
  const motion = new PlaneMotion(referenceEpochYr)
  const rows = planeRowBuffer()
  return {
    parameters: P,
    rows: points.reduce((sum, point) => sum + (point.epochYr === null ? 1 : 2), 0),
    evaluate(values, residuals, jacobian) {
      if (!motion.prepare(values)) return false
      let at = 0
      for (const point of points) {
        if (!planeRowsInto(point, motion, values, diameterScale ?? 1, rows, jacobian !== null)) return false
        for (let i = 0; i < rows.count; i++, at++) {
          residuals[at] = rows.values[i]!
          if (jacobian) jacobian.set(rows.gradients.subarray(i * P, (i + 1) * P), at * P)
        }
      }
      return true
    },
  }
}
