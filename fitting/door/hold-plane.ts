/** A conic in its plane with elements held: starts, solution, and its errors. */
import { atan2, cos, hypot, TWO_PI } from '../elementary'
import { expandedCovariance } from '../models/constrained-path'
import { heldPlane, heldPlaneProblem, type PlaneHeld } from '../models/held-plane'
import type { PlanePoints } from '../models/plane-measure'
import { covarianceOf, type CovarianceEstimate } from '../solve/covariance'
import { isInsideDomain, sumOfSquares, type LeastSquaresProblem } from '../solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'
import { median } from '../solve/median'
import { refuse } from './refusal'

const DIRECTIONS = 24
const SOLVED = 3

/** Conics in several directions, each of the size that the measures show there. */
function startsOf(points: PlanePoints, held: PlaneHeld, free: ArrayLike<number>): Float64Array[] {
  const e = held.eccentricity ?? hypot(free[1]!, free[2]!)
  const own = atan2(free[2]!, free[1]!)
  return Array.from({ length: DIRECTIONS }, (_, k) => {
    const direction = own + (k * TWO_PI) / DIRECTIONS
    const p = median(points.used.map((point) => point.r * (1 + e * cos(point.phiRad - direction))))
    return Float64Array.of(held.semiLatusRectum ?? p, e * cos(direction), e * cos(direction - TWO_PI / 4))
  })
}

function chiSquareAt(problem: LeastSquaresProblem, values: Float64Array): number {
  const residuals = new Float64Array(problem.rows)
  return problem.evaluate(values, residuals, null) ? sumOfSquares(residuals) : Infinity
}

/**
 * Solves with elements held.
 * @param points with their errors.
 * @param problem in (p, k, h).
 * @param held by name, at least one.
 * @param free solution without anything held, or an earlier one.
 * @returns the solution in (p, k, h), with the Jacobian by these.
 * @throws RefusedRequest where no such conic reaches every measured direction.
 */
export function solveHeldPlane(points: PlanePoints, problem: LeastSquaresProblem, held: PlaneHeld, free: ArrayLike<number>): Solution {
  const map = heldPlane(held, problem.parameters)
  const inner = heldPlaneProblem(problem, map)
  const starts = startsOf(points, held, free).map((values) => map.start(values)).filter((start) => isInsideDomain(inner, start))
    .sort((a, b) => chiSquareAt(inner, a) - chiSquareAt(inner, b)).slice(0, SOLVED)
  const [best] = starts.map((start) => solveLeastSquares(inner, start)).sort((a, b) => a.chiSquare - b.chiSquare)
  if (best === undefined) refuse('no-orbit-found', 'No conic with the held elements reaches every measured direction.', 'Leave an element free, or ask for another class of conic.')
  const values = new Float64Array(problem.parameters)
  map.expand(best.values, values, null)
  const residuals = new Float64Array(problem.rows)
  const jacobian = new Float64Array(problem.rows * problem.parameters)
  problem.evaluate(values, residuals, jacobian)
  return { ...best, values, residuals, jacobian }
}

/**
 * Covariance of (p, k, h), conditional on what is held.
 * @param solution in (p, k, h).
 * @param held by name; none for the plain covariance.
 * @returns the estimate, and how many parameters were free.
 */
export function planeCovariance({ values, residuals, jacobian }: Solution, held: PlaneHeld): CovarianceEstimate & { free: number } {
  const p = values.length
  const rows = residuals.length
  if (Object.keys(held).length === 0) return { ...covarianceOf({ rows, columns: p, jacobian, residuals }), free: p }
  const map = heldPlane(held, p)
  const y = map.start(values)
  const derivatives = new Float64Array(p * map.free)
  map.expand(y, new Float64Array(p), derivatives)
  const narrow = Float64Array.from({ length: rows * map.free }, (_, at) => {
    const [i, j] = [Math.floor(at / map.free), at % map.free]
    let sum = 0
    for (let k = 0; k < p; k++) sum += jacobian[i * p + k]! * derivatives[k * map.free + j]!
    return sum
  })
  const estimate = covarianceOf({ rows, columns: map.free, jacobian: narrow, residuals })
  return { ...estimate, matrix: estimate.matrix === null ? null : expandedCovariance(map, y, estimate.matrix), free: map.free }
}
