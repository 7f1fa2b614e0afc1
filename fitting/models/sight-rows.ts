/**
 * From lines of sight to whitened rows on the sky.
 *
 * With the observed direction u and its tangents e, n the rows are W·(x, y), x = 2d·e/(|d| + d·u), y likewise with n: the stereographic plane,
 * within θ³/12 of the angle, and finite all over the sky but for the point opposite.
 *
 * Source: Snyder 1987, Map Projections: A Working Manual, ch. 21.
 */
import type { LeastSquaresProblem } from '../solve/least-squares-problem'
import { emptyLineOfSight, lineOfSightInto, roughLightTime, type LineOfSight, type Motion, type Onlooker } from './line-of-sight'
import type { StateMap } from './sight-frame'

/** What one line of sight is computed and compared with. */
export interface Sight extends Onlooker {
  /** u, e, n, nine numbers. */
  axes: Float64Array
  /** W: rows (w₀x, w₁x + w₂y), 1/rad. */
  whitening: Float64Array
}

/**
 * The least-squares problem of lines of sight.
 * @param sights at least one.
 * @param map from parameters to the state at the epoch.
 * @param motion from the epoch to the sights.
 * @returns two whitened rows a sight, computed minus observed, with their Jacobian.
 * Source: Snyder 1987, Map Projections: A Working Manual, ch. 21 (stereographic projection).
 */
export function sightProblem(sights: readonly Sight[], map: StateMap, motion: Motion): LeastSquaresProblem {
  const p = map.parameters
  const state = new Float64Array(6)
  const byParameter = new Float64Array(6 * p)
  const found = emptyLineOfSight()
  const rowGradient = new Float64Array(12)
  return {
    parameters: p,
    rows: 2 * sights.length,
    evaluate(values, residuals, jacobian) {
      if (!map.stateInto(values, state, jacobian ? byParameter : null) || !motion.begin(state, jacobian !== null)) return false
      for (let i = 0; i < sights.length; i++) {
        const sight = sights[i]!
        if (!lineOfSightInto(sight, motion, roughLightTime(sight, state), found, jacobian !== null)) return false
        rowsInto(sight, found, residuals, 2 * i, jacobian ? rowGradient : null)
        if (jacobian) chainInto(rowGradient, byParameter, p, jacobian.subarray(2 * i * p, 2 * (i + 1) * p))
      }
      return true
    },
  }
}

/** Both rows at `from`, and their 2 × 6 derivatives by the state at the epoch. */
function rowsInto({ axes, whitening: w }: Sight, found: LineOfSight, rows: Float64Array, from: number, gradient: Float64Array | null): void {
  const { line: d, distance, partials } = found
  const alongU = d[0]! * axes[0]! + d[1]! * axes[1]! + d[2]! * axes[2]!
  const size = Math.max(distance + alongU, 1e-12 * distance)
  const x = 2 * (d[0]! * axes[3]! + d[1]! * axes[4]! + d[2]! * axes[5]!) / size
  const y = 2 * (d[0]! * axes[6]! + d[1]! * axes[7]! + d[2]! * axes[8]!) / size
  rows[from] = w[0]! * x
  rows[from + 1] = w[1]! * x + w[2]! * y
  if (!gradient) return
  for (let j = 0; j < 6; j++) {
    let [e, n, grow] = [0, 0, 0]
    for (let k = 0; k < 3; k++) {
      const part = partials[6 * k + j]!
      e += part * axes[k + 3]!
      n += part * axes[k + 6]!
      grow += part * (d[k]! / distance + axes[k]!)
    }
    const dx = (2 * e - x * grow) / size
    const dy = (2 * n - y * grow) / size
    gradient[j] = w[0]! * dx
    gradient[j + 6] = w[1]! * dx + w[2]! * dy
  }
}

/** Two rows by the state at the epoch, times its 6 × p derivatives by the parameters. */
function chainInto(byState: Float64Array, byParameter: Float64Array, p: number, out: Float64Array): void {
  for (let row = 0; row < 2; row++) {
    for (let j = 0; j < p; j++) {
      let sum = 0
      for (let k = 0; k < 6; k++) sum += byState[6 * row + k]! * byParameter[k * p + j]!
      out[row * p + j] = sum
    }
  }
}
