/**
 * One damped step of Levenberg and Marquardt on p + 1 rows, by the package ml-levenberg-marquardt.
 *   δ = −(RᵀR + λI)⁻¹ Rᵀc
 * The package is used as a step engine only: its stopping rule and its choice of the next start are not ours. It is
 * called with y = 0, start 0 and one iteration. At start 0 the rows are c; at its trial point the model is evaluated
 * once and row 0 carries √χ², so the package itself sees the true χ² of the trial.
 * Source: Levenberg 1944, Quart. Appl. Math. 2, 164; Marquardt 1963, J. SIAM 11, 431.
 */
import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import type { TriangularFactor } from './triangular-factor'

/** Evaluates χ² at a scaled step δ; Infinity outside the domain. */
export type TrialChiSquare = (scaledStep: ArrayLike<number>) => number

/** Stands for √χ² where the model is not defined: large, but finite for the package. */
const OUTSIDE_DOMAIN = 1e12

function isZero(values: readonly number[]): boolean {
  for (const value of values) if (value !== 0) return false
  return true
}

/**
 * Takes one damped step and evaluates the trial exactly once.
 * @param reduced R and c of the scaled problem, with Rᵀc ≠ 0.
 * @param damping λ > 0, relative to columns of unit length.
 * @param trial evaluates χ² at the scaled step.
 * @returns the scaled step; all zeros where it is lost in rounding.
 * Source: Marquardt 1963, J. SIAM 11, 431.
 */
export function dampedStep(reduced: TriangularFactor, damping: number, trial: TrialChiSquare): number[] {
  const { factor, rotated } = reduced
  const parameters = rotated.length - 1
  let step = new Array<number>(parameters).fill(0)
  const model = (values: number[]) => {
    if (isZero(values)) return (row: number) => rotated[row]!
    step = values.slice()
    const chiSquare = trial(values)
    const length = chiSquare < OUTSIDE_DOMAIN * OUTSIDE_DOMAIN ? Math.sqrt(chiSquare) : OUTSIDE_DOMAIN
    return (row: number) => (row === 0 ? length : 0)
  }
  const rows = Array.from({ length: parameters + 1 }, (_, index) => index)
  levenbergMarquardt({ x: rows, y: rows.map(() => 0) }, model, {
    initialValues: step.slice(),
    damping,
    maxIterations: 1,
    errorTolerance: 0,
    jacobianFunction: () => (row: number) =>
      row < parameters ? Array.from(factor.subarray(row * parameters, (row + 1) * parameters)) : new Array<number>(parameters).fill(0),
  })
  return step
}
