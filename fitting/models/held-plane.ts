/**
 * A conic in its plane with elements held: (p, k, h) from those of p, e, φ₀ that stay free. What follows in the parameters of a motion
 * with times goes through unchanged.
 */
import { atan2, cos, DEG, hypot, sin } from '../elementary'
import type { LeastSquaresProblem } from '../solve/least-squares-problem'
import type { ParameterMap } from './constrained-path'

export const PLANE_HOLDABLE = ['semiLatusRectum', 'eccentricity', 'periapsisDirection'] as const
export type PlaneHeld = Partial<Record<(typeof PLANE_HOLDABLE)[number], number>>

const CONIC = 3

/** The map with its start. */
export interface HeldPlane extends ParameterMap {
  start(values: ArrayLike<number>): Float64Array
}

/**
 * The map from the free of (p, e, φ₀) to (p, k, h).
 * @param held in published units (unit of r, 1, degrees).
 * @param full parameters of the whole problem, at least 3; those after the third are free.
 * @returns the map with its start; a circle has no φ₀.
 */
export function heldPlane(held: PlaneHeld, full: number): HeldPlane {
  const names = PLANE_HOLDABLE.filter((name) => held[name] === undefined && !(held.eccentricity === 0 && name === 'periapsisDirection'))
  const [ip, ie, id] = PLANE_HOLDABLE.map((name) => names.indexOf(name)) as [number, number, number]
  const own = names.length
  const free = own + full - CONIC
  return {
    free, full,
    expand(y, x, derivatives) {
      const p = ip < 0 ? held.semiLatusRectum! : y[ip]!
      const e = ie < 0 ? held.eccentricity! : y[ie]!
      const direction = id < 0 ? (held.periapsisDirection ?? 0) * DEG : y[id]!
      if (!(e >= 0)) return false
      const [c, s] = [cos(direction), sin(direction)]
      x[0] = p
      x[1] = e * c
      x[2] = e * s
      for (let j = CONIC; j < full; j++) x[j] = y[own + j - CONIC]!
      if (derivatives === null) return true
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
      for (let j = CONIC; j < full; j++) derivatives[j * free + own + j - CONIC] = 1
      return true
    },
    start(values) {
      const conic = { semiLatusRectum: values[0]!, eccentricity: hypot(values[1]!, values[2]!), periapsisDirection: atan2(values[2]!, values[1]!) }
      return Float64Array.from({ length: free }, (_, j) => (j < own ? conic[names[j]!] : values[j - own + CONIC]!))
    },
  }
}

/**
 * The problem in the free parameters.
 * @param full problem whose first parameters are p, k, h.
 * @param map of the held elements.
 * @returns a problem of map.free parameters.
 */
export function heldPlaneProblem(full: LeastSquaresProblem, map: HeldPlane): LeastSquaresProblem {
  const p = full.parameters
  const x = new Float64Array(p)
  const derivatives = new Float64Array(p * map.free)
  const wide = new Float64Array(p * full.rows)
  return {
    parameters: map.free,
    rows: full.rows,
    evaluate(values, residuals, jacobian) {
      if (!map.expand(values, x, derivatives) || !full.evaluate(x, residuals, jacobian ? wide : null)) return false
      if (!jacobian) return true
      for (let i = 0; i < full.rows; i++) {
        for (let j = 0; j < map.free; j++) {
          let sum = 0
          for (let k = 0; k < p; k++) sum += wide[p * i + k]! * derivatives[k * map.free + j]!
          jacobian[i * map.free + j] = sum
        }
      }
      return true
    },
  }
}
