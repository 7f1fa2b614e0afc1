/**
 * Paths without an orbit: still (x₀, y₀) and uniform straight motion (x₀, y₀, ẋ, ẏ) about a reference epoch.
 *   x = x₀ + ẋ (t − t₀),  y = y₀ + ẏ (t − t₀)       x north, y east, arcsec; t Julian years.
 */
import type { SkyPath } from './sky-path'

/**
 * Uniform straight motion.
 * @param referenceEpochYr t₀, Julian year.
 * @returns a path with parameters x₀, y₀ (arcsec), ẋ, ẏ (arcsec a year).
 */
export function linePath(referenceEpochYr: number): SkyPath {
  let current: ArrayLike<number> = [0, 0, 0, 0]
  return {
    parameters: 4,
    prepare(values) {
      current = values
      return true
    },
    at(epochYr, out, withPartials) {
      const elapsed = epochYr - referenceEpochYr
      out[0] = current[0]! + current[2]! * elapsed
      out[1] = current[1]! + current[3]! * elapsed
      if (!withPartials) return
      out.fill(0, 2, 10)
      out[2] = out[7] = 1
      out[4] = out[9] = elapsed
    },
  }
}

/**
 * A companion that does not move.
 * @returns a path with parameters x₀, y₀ (arcsec).
 */
export function stillPath(): SkyPath {
  let current: ArrayLike<number> = [0, 0]
  return {
    parameters: 2,
    prepare(values) {
      current = values
      return true
    },
    at(_epochYr, out, withPartials) {
      out[0] = current[0]!
      out[1] = current[1]!
      if (!withPartials) return
      out[2] = out[5] = 1
      out[3] = out[4] = 0
    },
  }
}
