/**
 * Levenberg–Marquardt on the three nonlinear parameters of a relative orbit, the constants eliminated.
 * Used to rank the scan's minima cheaply; what is published comes from the seven-parameter solver.
 * Source: Marquardt 1963, J. SIAM 11, 431; Kaufman 1975, BIT 15, 49.
 */
import { atanh, log, sinCosInto, TWO_PI } from '../elementary'
import { LARGEST_S } from '../models/relative-kepler'
import type { ProjectedOrbit } from './projected-orbit'
import type { ScanCell } from './scan'

/** A point of the search in the seven regular parameters (ln P, u, v, A₁, B₁, F₁, G₁). */
export interface Polished {
  values: Float64Array
  chiSquare: number
  /** The last step changed χ² by less than the tolerance. */
  hasSettled: boolean
}

/** Solves (S + λ diag S) δ = −g for three unknowns by Cholesky; false where a pivot vanishes. */
function dampedStep(reduced: Float64Array, gradient: Float64Array, damping: number, out: Float64Array): boolean {
  const grow = 1 + damping
  const a = reduced[0]! * grow
  const l11 = Math.sqrt(a)
  const l21 = reduced[3]! / l11
  const l31 = reduced[6]! / l11
  const d2 = reduced[4]! * grow - l21 * l21
  const l22 = Math.sqrt(d2)
  const l32 = (reduced[7]! - l31 * l21) / l22
  const d3 = reduced[8]! * grow - l31 * l31 - l32 * l32
  if (!(a > 0) || !(d2 > 0) || !(d3 > 0)) return false
  const l33 = Math.sqrt(d3)
  const z1 = -gradient[0]! / l11
  const z2 = (-gradient[1]! - l21 * z1) / l22
  const z3 = (-gradient[2]! - l31 * z1 - l32 * z2) / l33
  out[2] = z3 / l33
  out[1] = (z2 - l32 * out[2]!) / l22
  out[0] = (z1 - l21 * out[1]! - l31 * out[2]!) / l11
  return true
}

/** Keeps |(u, v)| inside the domain. */
function insideDomain(values: Float64Array): void {
  const s = Math.sqrt(values[1]! * values[1]! + values[2]! * values[2]!)
  const limit = LARGEST_S * 0.999
  if (s <= limit) return
  values[1] = (values[1]! * limit) / s
  values[2] = (values[2]! * limit) / s
}

/**
 * Start of the polish from a cell of the scan.
 * @param cell at its best phase.
 * @returns (ln P, u, v).
 */
export function startOf(cell: ScanCell): Float64Array {
  const s = atanh(cell.eccentricity)
  const direction = new Float64Array(2)
  sinCosInto(cell.phase * TWO_PI, direction)
  return Float64Array.of(log(cell.periodYr), s * direction[1]!, s * direction[0]!)
}

/**
 * Lowers χ² by damped steps.
 * @param orbit the projected problem.
 * @param start (ln P, u, v) inside the domain.
 * @param maxSteps trials allowed.
 * @param tolerance relative fall of χ² below which it has settled.
 * @returns the best point met, in seven parameters.
 */
export function polish(orbit: ProjectedOrbit, start: Float64Array, maxSteps: number, tolerance: number): Polished {
  let values = Float64Array.from(start)
  const step = new Float64Array(3)
  let hasSettled = false
  let damping = 1e-2
  if (!orbit.evaluate(values, true)) return { values: sevenParameters(values, orbit), chiSquare: Infinity, hasSettled }
  let best = { values: sevenParameters(values, orbit), chiSquare: orbit.chiSquare }
  for (let trial = 0; trial < maxSteps && !hasSettled; trial++) {
    if (!dampedStep(orbit.reduced, orbit.gradient, damping, step)) {
      damping = Math.max(damping, 1e-6) * 11
      if (damping > 1e8) break
      continue
    }
    const next = Float64Array.of(values[0]! + limited(step[0]!, 0.5), values[1]! + limited(step[1]!, 1), values[2]! + limited(step[2]!, 1))
    insideDomain(next)
    const before = best.chiSquare
    if (orbit.evaluate(next, false) && orbit.chiSquare < before) {
      hasSettled = before - orbit.chiSquare <= tolerance * before
      values = next
      best = { values: sevenParameters(values, orbit), chiSquare: orbit.chiSquare }
      damping = Math.max(damping / 9, 1e-9)
      if (!hasSettled) orbit.evaluate(values, true)
    } else {
      damping *= 11
      if (damping > 1e8) hasSettled = true
    }
  }
  return { ...best, hasSettled }
}

function limited(step: number, largest: number): number {
  return Math.max(-largest, Math.min(largest, step))
}

function sevenParameters(values: Float64Array, orbit: ProjectedOrbit): Float64Array {
  const constants = orbit.constants
  return Float64Array.of(values[0]!, values[1]!, values[2]!, constants[0]!, constants[2]!, constants[1]!, constants[3]!)
}

/**
 * True where two points are the same minimum.
 * @param a seven parameters.
 * @param b seven parameters.
 * @returns whether periods agree to 0.2 % and (e cos ϖ, e sin ϖ)-like coordinates to 0.005.
 */
export function isSameMinimum(a: ArrayLike<number>, b: ArrayLike<number>): boolean {
  return Math.abs(a[0]! - b[0]!) < 2e-3 && Math.abs(a[1]! - b[1]!) < 5e-3 && Math.abs(a[2]! - b[2]!) < 5e-3
}
