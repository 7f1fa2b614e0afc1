/**
 * Which of several equally good orbits comes first. Measures taken at equal intervals, once a year for instance, fit P and its aliases,
 * 1/P' = k/interval ± 1/P, exactly alike; the longest period is then the plain reading, and the others are its alternatives.
 */
import { isSameMinimum } from './polish'
import type { SettledPath } from './settle-path'

/** χ² this close to the best, in units of the reduced χ² where that is above 1, counts as equal. */
const EQUAL_WITHIN = 0.1
/** χ² of noise-free measures is rounding. */
const ROUNDING = 1e-9

function isSettled({ solution }: SettledPath): boolean {
  return solution.reason !== 'iteration-limit' && solution.reason !== 'singular'
}

/**
 * Chooses the orbit to publish among solutions.
 * @param solutions Kepler solutions, best first, at least one.
 * @param degreesOfFreedom of the fit, ≥ 0.
 * @returns the solution of the longest period among those whose χ² equals the best to 0.1; the best itself where none is longer.
 */
export function preferredSolution(solutions: readonly SettledPath[], degreesOfFreedom: number): SettledPath {
  const best = solutions[0]!
  const least = best.solution.chiSquare
  const unit = Math.max(1, degreesOfFreedom > 0 ? least / degreesOfFreedom : 1)
  let preferred = best
  for (const other of solutions) {
    const isEqual = other.solution.chiSquare - least <= EQUAL_WITHIN * unit + ROUNDING
    const isLonger = other.solution.values[0]! > preferred.solution.values[0]!
    if (isEqual && isLonger && isSettled(other) && !isSameMinimum(other.solution.values, preferred.solution.values)) preferred = other
  }
  return preferred
}
