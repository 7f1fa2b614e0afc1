/**
 * The last step of a relative fit: Levenberg–Marquardt on the final rows, the errors of θ weighed with the computed ρ.
 * The first pass weighs with the observed ρ; each further pass with the ρ just computed, until that no longer changes.
 */
import { skyProblem, skyRows } from '../models/relative-problem'
import type { SkyMeasure } from '../models/sky-measure'
import type { SkyPath } from '../models/sky-path'
import type { SkyRow } from '../models/sky-rows'
import { isInsideDomain } from '../solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'

const LARGEST_PASSES = 8
const RHO_SETTLED = 1e-9
const FULL_ITERATIONS = 200
/** Enough to tell whether another minimum competes. */
const SHORT_ITERATIONS = 60
/** Times the best may change hands while weights settle. */
const LARGEST_ROUNDS = 3

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

/** Passes until the weights no longer change, from a solution on some rows. */
function settle(path: SkyPath, measures: readonly SkyMeasure[], first: SettledPath): SettledPath {
  let { solution, rows, iterations } = first
  if (!rows.some((row) => row.form === 'pair' && row.measure.form === 'polar')) return first
  let weighed: Float64Array = Float64Array.from(measures, (measure) => measure.rhoArcsec)
  for (let pass = 1; pass < LARGEST_PASSES; pass++) {
    const rho = computedRho(path, solution.values, measures)
    if (largestRelativeChange(weighed, rho) <= RHO_SETTLED) break
    weighed = rho
    rows = skyRows(measures, rho)
    solution = solveLeastSquares(skyProblem(path, rows), solution.values)
    iterations += solution.iterations
  }
  return { solution, rows, iterations }
}

function solveOn(path: SkyPath, rows: SkyRow[], start: ArrayLike<number>, maxIterations: number): SettledPath {
  const solution = solveLeastSquares(skyProblem(path, rows), start, { maxIterations })
  return { solution, rows, iterations: solution.iterations }
}

/**
 * Fits a path to used measures from a start.
 * @param path its parameters are fitted.
 * @param measures used measures, sorted.
 * @param start inside the domain of the path.
 * @returns the solution with the rows it was found with.
 */
export function settlePath(path: SkyPath, measures: readonly SkyMeasure[], start: ArrayLike<number>): SettledPath {
  return settle(path, measures, solveOn(path, skyRows(measures), start, FULL_ITERATIONS))
}

const byChiSquare = (a: SettledPath, b: SettledPath) => a.solution.chiSquare - b.solution.chiSquare

/**
 * Fits a path from several starts; the best is settled, the others are solved on the rows of the best, so that their χ² compare.
 * @param path its parameters are fitted.
 * @param measures used measures, sorted.
 * @param starts most promising first; those outside the domain are left out.
 * @param onProgress called with the part done, 0 … 1.
 * @returns one solution a start inside the domain, best first.
 */
export function settleStarts(path: SkyPath, measures: readonly SkyMeasure[], starts: readonly ArrayLike<number>[], onProgress: (part: number) => void): SettledPath[] {
  const rows = skyRows(measures)
  const problem = skyProblem(path, rows)
  let solutions = starts.filter((start) => isInsideDomain(problem, start)).map((start, i) => {
    const solved = solveOn(path, rows, start, i < 2 ? FULL_ITERATIONS : SHORT_ITERATIONS)
    onProgress((i + 1) / (2 * starts.length))
    return solved
  }).sort(byChiSquare)
  for (let round = 0; round < LARGEST_ROUNDS && solutions.length > 0; round++) {
    const best = settle(path, measures, solutions[0]!)
    const others = solutions.slice(1).map((other) => (best.rows === other.rows ? other : solveOn(path, best.rows, other.solution.values, SHORT_ITERATIONS)))
    solutions = [best, ...others].sort(byChiSquare)
    if (solutions[0] === best) break
  }
  onProgress(1)
  return solutions
}
