import type { LeastSquaresProblem } from '../../fitting/solve/least-squares-problem'

/** Jacobian of a problem's whitened residuals by central differences, row-major; for comparison with the analytic one. */
export function centralDifferences(problem: LeastSquaresProblem, values: ArrayLike<number>, relativeStep = 1e-6): Float64Array {
  const jacobian = new Float64Array(problem.rows * problem.parameters)
  const above = new Float64Array(problem.rows)
  const below = new Float64Array(problem.rows)
  for (let j = 0; j < problem.parameters; j++) {
    const step = relativeStep * Math.max(Math.abs(values[j]!), 1e-3)
    const shifted = Float64Array.from(values)
    shifted[j] = values[j]! + step
    problem.evaluate(shifted, above, null)
    shifted[j] = values[j]! - step
    problem.evaluate(shifted, below, null)
    for (let i = 0; i < problem.rows; i++) jacobian[i * problem.parameters + j] = (above[i]! - below[i]!) / (2 * step)
  }
  return jacobian
}
