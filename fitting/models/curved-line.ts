/**
 * Straight motion with a first trace of curvature, ẍ = −κ r/ρ³ integrated twice along the straight line r(t) itself:
 *   x = x₀ + ẋ (t − t₀) + κ gₓ(t),  y likewise;  with s the way along the line from its closest approach d, v the motion, û and n̂ the
 *   directions along the line and from the primary to the closest approach,
 *   g = [asinh(s/d) û − (ρ/d) n̂] / v²,  ρ² = d² + s²
 * What the two integrations leave open is itself straight motion. κ > 0 is attraction.
 */
import { asinh } from '../elementary'
import type { SkyPath } from './sky-path'

/** Closest approaches below this part of the arc's length are taken as this part: g grows without bound as d → 0. */
const SMALLEST_APPROACH_PART = 1e-3

/** A straight motion: position at t₀ and motion, x north, y east. */
export interface StraightMotion {
  x0: number
  y0: number
  xDot: number
  yDot: number
  referenceEpochYr: number
  spanYr: number
}

/**
 * The path with parameters x₀, y₀ (arcsec), ẋ, ẏ (arcsec a year), κ (arcsec³ a year²).
 * @param along the straight motion that g is integrated along; it must move.
 * @returns a path that is linear in all five parameters.
 */
export function curvedLinePath(along: StraightMotion): SkyPath {
  const { x0, y0, xDot, yDot, referenceEpochYr, spanYr } = along
  const speed = Math.sqrt(xDot * xDot + yDot * yDot)
  const ux = xDot / speed
  const uy = yDot / speed
  const signed = x0 * uy - y0 * ux
  const side = signed < 0 ? -1 : 1
  const approach = Math.max(Math.abs(signed), SMALLEST_APPROACH_PART * speed * spanYr)
  const startAlong = x0 * ux + y0 * uy
  let current: ArrayLike<number> = [0, 0, 0, 0, 0]
  return {
    parameters: 5,
    prepare(values) {
      current = values
      return true
    },
    at(epochYr, out, withPartials) {
      const elapsed = epochYr - referenceEpochYr
      const s = startAlong + speed * elapsed
      const rho = Math.sqrt(approach * approach + s * s)
      const forward = asinh(s / approach) / (speed * speed)
      const inward = (-side * rho) / approach / (speed * speed)
      const gx = forward * ux + inward * uy
      const gy = forward * uy - inward * ux
      out[0] = current[0]! + current[2]! * elapsed + current[4]! * gx
      out[1] = current[1]! + current[3]! * elapsed + current[4]! * gy
      if (!withPartials) return
      out.fill(0, 2, 12)
      out[2] = out[8] = 1
      out[4] = out[10] = elapsed
      out[6] = gx
      out[11] = gy
    },
  }
}
