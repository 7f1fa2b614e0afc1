/**
 * The last step of a relative fit: Levenberg–Marquardt on the final rows, the errors of θ weighed with the computed ρ.
 * The first pass weighs with the observed ρ; each further pass with the ρ just computed, until that no longer changes.
 */
import { skyProblem, skyRows } from '../models/relative-problem'
import type { SkyMeasure } from '../models/sky-measure'
import type { SkyPath } from '../models/sky-path'
import type { SkyRow } from '../models/sky-rows'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'

const LARGEST_PASSES = 8
const RHO_SETTLED = 1e-9

export interface SettledPath {
  solution: Solution
  rows: SkyRow[]
  iterations: number
}

/**
 * Separations computed at the epochs of the measures.
 * @param path any path on the sky.
 * @param values its parameters, inside the domain.
 * @param measures any measures.
 * @returns ρ, arcsec, one a measure.
 */
export function computedRho(path: SkyPath, values: ArrayLike<number>, measures: readonly SkyMeasure[]): Float64Array {
  const position = new Float64Array(2 + 2 * path.parameters)
  path.prepare(values)
  return Float64Array.from(measures, (measure) => {
    path.at(measure.epochYr, position, false)
    return Math.sqrt(position[0]! * position[0]! + position[1]! * position[1]!)
  })
}

function largestRelativeChange(before: Float64Array, after: Float64Array): number {
  let largest = 0
  for (let i = 0; i < after.length; i++) largest = Math.max(largest, Math.abs(after[i]! - before[i]!) / Math.max(after[i]!, 1e-300))
  return largest
}

/**
 * Fits a path to used measures from a start.
 * @param path its parameters are fitted.
 * @param measures used measures, sorted.
 * @param start inside the domain of the path.
 * @returns the solution with the rows it was found with.
 */
export function settlePath(path: SkyPath, measures: readonly SkyMeasure[], start: ArrayLike<number>): SettledPath {
  let rows = skyRows(measures)
  let solution = solveLeastSquares(skyProblem(path, rows), start)
  let iterations = solution.iterations
  const weighsRho = rows.some((row) => row.form === 'pair' && row.measure.form === 'polar')
  let weighed: Float64Array = Float64Array.from(measures, (measure) => measure.rhoArcsec)
  for (let pass = 1; weighsRho && pass < LARGEST_PASSES; pass++) {
    const rho = computedRho(path, solution.values, measures)
    if (largestRelativeChange(weighed, rho) <= RHO_SETTLED) break
    weighed = rho
    rows = skyRows(measures, rho)
    solution = solveLeastSquares(skyProblem(path, rows), solution.values)
    iterations += solution.iterations
  }
  return { solution, rows, iterations }
}
