/** A conic in its plane with elements held: (p, k, h) from those of p, e, φ₀ that stay free. */
import { atan2, cos, DEG, hypot, sin } from '../elementary'
import type { LeastSquaresProblem } from '../solve/least-squares-problem'

export const PLANE_HOLDABLE = ['semiLatusRectum', 'eccentricity', 'periapsisDirection'] as const
export type PlaneHeld = Partial<Record<(typeof PLANE_HOLDABLE)[number], number>>

/** Three values and their derivatives by the free parameters. */
export interface HeldPlane {
  free: number
  /** (p, k, h) of the free parameters, and ∂(p, k, h) row-major 3 × free; false outside the domain. */
  expand(y: ArrayLike<number>, x: Float64Array, derivatives: Float64Array): boolean
  start(values: ArrayLike<number>): Float64Array
}

/**
 * The map from the free of (p, e, φ₀) to (p, k, h).
 * @param held in published units (unit of r, 1, degrees).
 * @returns the map with its start; a circle has no φ₀.
 */
export function heldPlane(held: PlaneHeld): HeldPlane {
  const isCircle = held.eccentricity === 0
  const names = PLANE_HOLDABLE.filter((name) => held[name] === undefined && !(isCircle && name === 'periapsisDirection'))
  const index = (name: (typeof PLANE_HOLDABLE)[number]) => names.indexOf(name)
  const [ip, ie, id] = [index('semiLatusRectum'), index('eccentricity'), index('periapsisDirection')]
  const free = names.length
  return {
    free,
    expand(y, x, derivatives) {
      const p = ip < 0 ? held.semiLatusRectum! : y[ip]!
      const e = ie < 0 ? held.eccentricity! : y[ie]!
      const direction = id < 0 ? (held.periapsisDirection ?? 0) * DEG : y[id]!
      if (!(e >= 0)) return false
      const [c, s] = [cos(direction), sin(direction)]
      x[0] = p
      x[1] = e * c
      x[2] = e * s
      derivatives.fill(0)
      if (ip >= 0) derivatives[ip] = 1
      if (ie >= 0) {
        derivatives[free + ie] = c
        derivatives[2 * free + ie] = s
      }
      if (id >= 0) {
        derivatives[free + id] = -e * s
        derivatives[2 * free + id] = e * c
      }
      return true
    },
    start(values) {
      const own = { semiLatusRectum: values[0]!, eccentricity: hypot(values[1]!, values[2]!), periapsisDirection: atan2(values[2]!, values[1]!) }
      return Float64Array.from(names, (name) => own[name])
    },
  }
}

/**
 * The problem in the free parameters.
 * @param full problem in (p, k, h).
 * @param map of the held elements.
 * @returns a problem of map.free parameters.
 */
export function heldPlaneProblem(full: LeastSquaresProblem, map: HeldPlane): LeastSquaresProblem {
  const x = new Float64Array(3)
  const derivatives = new Float64Array(3 * map.free)
  const wide = new Float64Array(3 * full.rows)
  return {
    parameters: map.free,
    rows: full.rows,
    evaluate(values, residuals, jacobian) {
      if (!map.expand(values, x, derivatives) || !full.evaluate(x, residuals, jacobian ? wide : null)) return false
      if (!jacobian) return true
      for (let i = 0; i < full.rows; i++) {
        for (let j = 0; j < map.free; j++) {
          let sum = 0
          for (let k = 0; k < 3; k++) sum += wide[3 * i + k]! * derivatives[k * map.free + j]!
          jacobian[i * map.free + j] = sum
        }
      }
      return true
    },
  }
}
