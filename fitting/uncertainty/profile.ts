/**
 * Profile likelihood: how far a derived quantity q can go while all parameters follow, until χ² has risen by a level.
 * A point of the profile is the minimum of χ² + w² (q − c)²: whatever w, it is the least χ² for its own q, so that q and χ² there are exact.
 * c moves by the secant of ±√Δχ² against q until the level is met; from 30 times the linearised distance on, q counts as not bounded.
 * Source: Venzon & Moolgavkar 1988, Applied Statistics 37, 87 (profile intervals); the penalty in place of their equations is ours.
 */
import { isInsideDomain, type LeastSquaresProblem } from '../solve/least-squares-problem'
import { solveLeastSquares } from '../solve/levenberg-marquardt'
import type { ProfileInterval } from '../types'
import { studentQuantile } from './distributions'
import { quadraticForm, type ErrorScale } from './error-scale'

/** w in units of 1/σ. */
const STIFFNESS = 10
/** c lies beyond the goal by what the pull falls short on a linear problem. */
const OVERSHOOT = 1 + 1 / (STIFFNESS * STIFFNESS)
const MOST_SOLVES = 7
const SOLVER = { maxIterations: 15, chiSquareTolerance: 1e-8 }
/** √Δχ² is met to this part. */
const MET_WITHIN = 0.003
const LARGEST_STRETCH = 2.5
const UNBOUNDED_FROM = 30
const NORMAL_975 = 1.959963984540054
const ONE_SIGMA_PROBABILITY = 0.8413447460685429

/** The minimum that is profiled. */
export interface Minimum {
  problem: LeastSquaresProblem
  values: Float64Array
  chiSquare: number
  /** For unit variance. */
  covariance: number[][]
  /** √Δχ² at 68.27 % and at 95 %. */
  roots: readonly [number, number]
}

/** A derived quantity near the minimum, continuous there, with its gradient. */
export interface Profiled {
  at: (values: ArrayLike<number>) => { value: number; gradient: ArrayLike<number> }
  /** Values that it cannot pass. */
  from?: number
  to?: number
}

/**
 * √Δχ² to which profiles are followed.
 * @param scale of the fit.
 * @param degreesOfFreedom ≥ 0.
 * @returns 1 and 1.96 where every error was stated; else the scatter times the points of Student's t. Null without an error to publish.
 * Source: Student 1908, Biometrika 6, 1.
 */
export function profileRoots({ basis, published }: ErrorScale, degreesOfFreedom: number): readonly [number, number] | null {
  if (published === null) return null
  if (basis === 'formal') return [1, NORMAL_975]
  return [published, (published / studentQuantile(ONE_SIGMA_PROBABILITY, degreesOfFreedom)) * studentQuantile(0.975, degreesOfFreedom)]
}

/** The problem with one row more, which pulls q to c. */
function pulled(problem: LeastSquaresProblem, at: Profiled['at'], goal: { value: number; weight: number }): LeastSquaresProblem {
  const { parameters, rows } = problem
  return {
    parameters,
    rows: rows + 1,
    evaluate(values, residuals, jacobian) {
      if (!problem.evaluate(values, residuals.subarray(0, rows), jacobian === null ? null : jacobian.subarray(0, rows * parameters))) return false
      const quantity = at(values)
      residuals[rows] = (quantity.value - goal.value) * goal.weight
      if (jacobian) for (let j = 0; j < parameters; j++) jacobian[rows * parameters + j] = quantity.gradient[j]! * goal.weight
      return residuals[rows]! - residuals[rows]! === 0 && Array.from(quantity.gradient).every((entry) => entry - entry === 0)
    },
  }
}

interface Point {
  values: Float64Array
  /** Distance of q from the minimum, positive outwards, and √Δχ². */
  distance: number
  root: number
}

class Side {
  private readonly centre: number
  private readonly direction: Float64Array
  private readonly sigma: number

  constructor(
    private readonly minimum: Minimum,
    private readonly profiled: Profiled,
    private readonly sign: 1 | -1,
  ) {
    const { value, gradient } = profiled.at(minimum.values)
    this.centre = value
    this.sigma = Math.sqrt(quadraticForm(minimum.covariance, gradient))
    this.direction = Float64Array.from(minimum.covariance, (row) => row.reduce((sum, entry, j) => sum + entry * gradient[j]!, 0) / this.sigma)
  }

  isDetermined(): boolean {
    return this.sigma > 0 && this.sigma < Infinity
  }

  /** Least χ² near a distance, from the values given or the nearest to them where a solve can begin. */
  private solve(distance: number, from: ArrayLike<number>): Point | null {
    const { minimum: { problem, values, chiSquare }, profiled, centre, sign, sigma } = this
    const system = pulled(problem, profiled.at, { value: centre + sign * distance * OVERSHOOT, weight: STIFFNESS / sigma })
    let start = Float64Array.from(from)
    for (let i = 0; i < 6 && !isInsideDomain(system, start); i++) start = start.map((value, j) => (value + values[j]!) / 2)
    if (!isInsideDomain(system, start)) return null
    const solution = solveLeastSquares(system, start, SOLVER)
    const pull = solution.residuals[problem.rows]!
    const reached = sign * (profiled.at(solution.values).value - centre)
    return { values: solution.values, distance: reached, root: Math.sqrt(Math.max(0, solution.chiSquare - pull * pull - chiSquare)) }
  }

  /** Where the quantity cannot go on: its distance from the minimum. */
  private wall(): number {
    const limit = this.sign > 0 ? this.profiled.to : this.profiled.from
    return limit === undefined ? Infinity : this.sign * (limit - this.centre)
  }

  /** Values a linear problem would have at a distance. */
  private linear(distance: number): Float64Array {
    return this.minimum.values.map((value, j) => value + (this.sign * this.direction[j]! * distance) / this.sigma)
  }

  /** The end of the interval at a level, and the last point on the way; null where it is not bounded. */
  end(root: number, before: Point | null): { value: number | null; point: Point | null } {
    const wall = this.wall()
    let inner: Point = before ?? { values: this.minimum.values, distance: 0, root: 0 }
    let last: Point | null = before
    let outer: Point | null = null
    let previous = inner
    let goal = before !== null && before.root > 0 ? (before.distance * root) / before.root : root * this.sigma
    for (let i = 0; i < MOST_SOLVES; i++) {
      goal = Math.min(goal, wall)
      const from = last !== null && last.distance > 0 ? last.values : this.linear(goal)
      const point = this.solve(goal, from)
      if (point === null || !(point.distance > 0) || !(point.root < Infinity)) break
      last = point
      if (Math.abs(point.root - root) <= MET_WITHIN * root) return this.found(point.distance + ((root - point.root) * point.distance) / point.root, wall, point)
      if (point.root > root) outer = point
      else if (goal === wall) return { value: this.centre + this.sign * wall, point }
      else inner = point
      goal = this.nextGoal(root, { inner, outer, point, previous })
      previous = point
      if (goal > UNBOUNDED_FROM * root * this.sigma) return { value: null, point }
    }
    if (outer === null) return { value: null, point: last }
    return this.found(inner.distance + ((outer.distance - inner.distance) * (root - inner.root)) / (outer.root - inner.root), wall, outer)
  }

  private found(distance: number, wall: number, point: Point) {
    const value = this.centre + this.sign * Math.min(distance, wall)
    return { value: value - value === 0 ? value : null, point }
  }

  /** By the secant of the last two points where it stays between those inside and outside; outward no faster than the largest stretch. */
  private nextGoal(root: number, { inner, outer, point, previous }: { inner: Point; outer: Point | null; point: Point; previous: Point }): number {
    const slope = (point.distance - previous.distance) / (point.root - previous.root)
    const secant = point.distance + (root - point.root) * slope
    if (outer === null) {
      const furthest = point.distance * LARGEST_STRETCH
      return secant > point.distance ? Math.min(furthest, secant + 0.02 * (secant - point.distance)) : furthest
    }
    if (secant > inner.distance && secant < outer.distance) return secant
    return inner.distance + ((outer.distance - inner.distance) * (root - inner.root)) / (outer.root - inner.root)
  }
}

/**
 * Profile intervals of one quantity.
 * @param minimum solution that is profiled.
 * @param profiled the quantity.
 * @returns ends of the intervals of 68.27 and 95 %, in its unit, null where the measures do not bound it on that side; null as a whole
 * where the quantity is not determined.
 * Source: Venzon & Moolgavkar 1988, Applied Statistics 37, 87.
 */
export function profileInterval(minimum: Minimum, profiled: Profiled): ProfileInterval | null {
  const [low, high] = ([-1, 1] as const).map((sign) => new Side(minimum, profiled, sign)) as [Side, Side]
  if (!low.isDetermined()) return null
  const [innerLow, innerHigh] = [low.end(minimum.roots[0], null), high.end(minimum.roots[0], null)]
  const outerOf = (side: Side, inner: { value: number | null; point: Point | null }) => (inner.value === null ? null : side.end(minimum.roots[1], inner.point).value)
  return { low68: innerLow.value, high68: innerHigh.value, low95: outerOf(low, innerLow), high95: outerOf(high, innerHigh) }
}
