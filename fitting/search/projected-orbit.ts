/**
 * A relative orbit as a function of (ln P, u, v) alone: the Thiele–Innes constants are eliminated at every point.
 * Gauss–Newton on the reduced problem is the Schur complement of the full normal matrix,
 *   S = H_nn − H_nl H_ll⁻¹ H_ln,   g = gradient by (ln P, u, v) at the best constants
 * (n nonlinear, l linear), which is Kaufman's form of variable projection.
 * Source: Golub & Pereyra 1973, SIAM J. Numer. Anal. 10, 413; Kaufman 1975, BIT 15, 49.
 */
import { TurnedOrbit } from '../models/relative-kepler'
import { factorLinear, solveLinear, type LinearSums } from './linear-constants'
import type { SearchPoints } from './search-points'

/** χ² with its reduced normal equations at one (ln P, u, v). */
export class ProjectedOrbit {
  chiSquare = Infinity
  /** A, F, B, G at the last evaluated point. */
  readonly constants = new Float64Array(4)
  /** S, row-major 3 × 3, and g, at the last linearised point. */
  readonly reduced = new Float64Array(9)
  readonly gradient = new Float64Array(3)
  private readonly orbit: TurnedOrbit
  private readonly factored = new Float64Array(14)
  private readonly X: Float64Array
  private readonly Y: Float64Array
  /** ∂X, ∂Y by ln P, u, v, six a measure. */
  private readonly partials: Float64Array
  private readonly sums: LinearSums = {
    m11XX: 0, m11XY: 0, m11YY: 0, m12XX: 0, m12XY: 0, m12YY: 0, m22XX: 0, m22XY: 0, m22YY: 0, v1X: 0, v1Y: 0, v2X: 0, v2Y: 0,
  }

  constructor(
    private readonly points: SearchPoints,
    referenceEpochYr: number,
  ) {
    this.orbit = new TurnedOrbit(referenceEpochYr)
    this.X = new Float64Array(points.count)
    this.Y = new Float64Array(points.count)
    this.partials = new Float64Array(6 * points.count)
  }

  /** Evaluates χ² (and where asked S and g) at (ln P, u, v); false outside the domain. */
  evaluate(values: Float64Array, withNormalEquations: boolean): boolean {
    if (!this.orbit.prepare(values[0]!, values[1]!, values[2]!)) return false
    const { points, orbit, X, Y, partials } = this
    for (let i = 0; i < points.count; i++) {
      orbit.at(points.epochsYr[i]!, withNormalEquations)
      X[i] = orbit.X
      Y[i] = orbit.Y
      if (withNormalEquations) partials.set(orbit.partials, 6 * i)
    }
    this.sumLinear()
    this.chiSquare = points.constant - factorLinear(this.sums, this.factored)
    if (!(this.chiSquare < Infinity)) return false
    solveLinear(this.factored, this.constants)
    if (withNormalEquations) this.reduce()
    return true
  }

  private sumLinear(): void {
    const { points, X, Y, sums } = this
    const { m11, m12, m22, v1, v2 } = points
    for (const key of Object.keys(sums) as (keyof LinearSums)[]) sums[key] = 0
    for (let i = 0; i < points.count; i++) {
      const x = X[i]!
      const y = Y[i]!
      const xx = x * x
      const xy = x * y
      const yy = y * y
      sums.m11XX += m11[i]! * xx
      sums.m11XY += m11[i]! * xy
      sums.m11YY += m11[i]! * yy
      sums.m12XX += m12[i]! * xx
      sums.m12XY += m12[i]! * xy
      sums.m12YY += m12[i]! * yy
      sums.m22XX += m22[i]! * xx
      sums.m22XY += m22[i]! * xy
      sums.m22YY += m22[i]! * yy
      sums.v1X += v1[i]! * x
      sums.v1Y += v1[i]! * y
      sums.v2X += v2[i]! * x
      sums.v2Y += v2[i]! * y
    }
  }

  private reduce(): void {
    const { points, X, Y, partials, constants, factored, reduced, gradient } = this
    const { m11, m12, m22, v1, v2 } = points
    const A = constants[0]!
    const F = constants[1]!
    const B = constants[2]!
    const G = constants[3]!
    reduced.fill(0)
    gradient.fill(0)
    /** H_ln, 4 × 3, in the order A, F, B, G. */
    const mixed = new Float64Array(12)
    const dx = new Float64Array(3)
    const dy = new Float64Array(3)
    for (let i = 0; i < points.count; i++) {
      const x = A * X[i]! + F * Y[i]!
      const y = B * X[i]! + G * Y[i]!
      const rx = m11[i]! * x + m12[i]! * y - v1[i]!
      const ry = m12[i]! * x + m22[i]! * y - v2[i]!
      for (let j = 0; j < 3; j++) {
        const byX = partials[6 * i + j]!
        const byY = partials[6 * i + 3 + j]!
        dx[j] = A * byX + F * byY
        dy[j] = B * byX + G * byY
      }
      for (let j = 0; j < 3; j++) {
        const wx = m11[i]! * dx[j]! + m12[i]! * dy[j]!
        const wy = m12[i]! * dx[j]! + m22[i]! * dy[j]!
        gradient[j] = gradient[j]! + rx * dx[j]! + ry * dy[j]!
        for (let k = 0; k <= j; k++) reduced[3 * j + k] = reduced[3 * j + k]! + wx * dx[k]! + wy * dy[k]!
        mixed[j] = mixed[j]! + wx * X[i]!
        mixed[3 + j] = mixed[3 + j]! + wx * Y[i]!
        mixed[6 + j] = mixed[6 + j]! + wy * X[i]!
        mixed[9 + j] = mixed[9 + j]! + wy * Y[i]!
      }
    }
    this.subtractLinear(mixed, factored, reduced)
  }

  /** S = H_nn − (L⁻¹ H_ln)ᵀ (L⁻¹ H_ln). */
  private subtractLinear(mixed: Float64Array, factored: Float64Array, reduced: Float64Array): void {
    for (let j = 0; j < 3; j++) {
      const z1 = mixed[j]! * factored[0]!
      const z2 = (mixed[3 + j]! - factored[1]! * z1) * factored[2]!
      const z3 = (mixed[6 + j]! - factored[3]! * z1 - factored[4]! * z2) * factored[5]!
      const z4 = (mixed[9 + j]! - factored[6]! * z1 - factored[7]! * z2 - factored[8]! * z3) * factored[9]!
      mixed[j] = z1
      mixed[3 + j] = z2
      mixed[6 + j] = z3
      mixed[9 + j] = z4
    }
    for (let j = 0; j < 3; j++) {
      for (let k = 0; k <= j; k++) {
        let dot = 0
        for (let row = 0; row < 4; row++) dot += mixed[3 * row + j]! * mixed[3 * row + k]!
        reduced[3 * j + k] = reduced[3 * j + k]! - dot
        reduced[3 * k + j] = reduced[3 * j + k]!
      }
    }
  }
}
