/** A path in fewer parameters: some are held, or several follow from others. */
import type { SkyPath } from './sky-path'

/** Full parameters x as a function of free parameters y. */
export interface ParameterMap {
  readonly free: number
  readonly full: number
  /** Fills x and, where asked, ∂x/∂y (row-major, full × free); false where y is outside the domain. */
  expand(y: ArrayLike<number>, x: Float64Array, derivatives: Float64Array | null): boolean
}

/**
 * The path in the free parameters.
 * @param path in the full parameters.
 * @param map from free to full.
 * @returns a path of map.free parameters.
 */
export function constrainedPath(path: SkyPath, map: ParameterMap): SkyPath {
  const x = new Float64Array(map.full)
  const derivatives = new Float64Array(map.full * map.free)
  const wide = new Float64Array(2 + 2 * map.full)
  return {
    parameters: map.free,
    prepare: (values) => map.expand(values, x, derivatives) && path.prepare(x),
    at(epochYr, out, withPartials) {
      path.at(epochYr, wide, withPartials)
      out[0] = wide[0]!
      out[1] = wide[1]!
      if (!withPartials) return
      for (let j = 0; j < map.free; j++) {
        let byX = 0
        let byY = 0
        for (let k = 0; k < map.full; k++) {
          byX += wide[2 + k]! * derivatives[k * map.free + j]!
          byY += wide[2 + map.full + k]! * derivatives[k * map.free + j]!
        }
        out[2 + j] = byX
        out[2 + map.free + j] = byY
      }
    },
  }
}

/**
 * Covariance of the full parameters, D C Dᵀ.
 * @param map from free to full.
 * @param y free parameters, inside the domain.
 * @param covariance of the free parameters, at least map.free square.
 * @returns full × full; singular where the map has fewer free than full.
 */
export function expandedCovariance(map: ParameterMap, y: ArrayLike<number>, covariance: number[][]): number[][] {
  const { free, full } = map
  const derivatives = new Float64Array(full * free)
  map.expand(y, new Float64Array(full), derivatives)
  const half = Array.from({ length: full }, (_, i) => Array.from({ length: free }, (__, j) => {
    let sum = 0
    for (let k = 0; k < free; k++) sum += derivatives[i * free + k]! * covariance[k]![j]!
    return sum
  }))
  const entry = (i: number, j: number) => {
    let sum = 0
    for (let k = 0; k < free; k++) sum += half[i]![k]! * derivatives[j * free + k]!
    return sum
  }
  return Array.from({ length: full }, (_, i) => Array.from({ length: full }, (__, j) => entry(Math.max(i, j), Math.min(i, j))))
}
