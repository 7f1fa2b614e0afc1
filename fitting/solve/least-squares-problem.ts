/** What a solver is given: whitened residuals, their Jacobian, and where they are defined. */

/** A least-squares problem in whitened form. */
export interface LeastSquaresProblem {
  parameters: number
  rows: number
  /**
   * Fills whitened residuals (computed minus observed) and, where asked, their Jacobian (row-major rows × parameters).
   * Returns false where the model is not defined at these values.
   */
  evaluate(values: Float64Array, residuals: Float64Array, jacobian: Float64Array | null): boolean
}

/**
 * χ² of whitened residuals.
 * @param values any numbers.
 * @returns Σ v².
 */
export function sumOfSquares(values: Float64Array): number {
  let sum = 0
  for (let i = 0; i < values.length; i++) sum += values[i]! * values[i]!
  return sum
}

/**
 * True where a solver can start.
 * @param problem whitened residuals and Jacobian.
 * @param values one a parameter.
 * @returns whether the model is defined there with a finite χ².
 */
export function isInsideDomain(problem: LeastSquaresProblem, values: ArrayLike<number>): boolean {
  const residuals = new Float64Array(problem.rows)
  return problem.evaluate(Float64Array.from(values), residuals, null) && sumOfSquares(residuals) < Infinity
}
