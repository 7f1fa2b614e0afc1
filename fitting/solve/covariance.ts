/**
 * Covariance of least-squares parameters by singular values of the column-scaled Jacobian.
 *   J D⁻¹ = U S Vᵀ   →   C = D⁻¹ V S⁻² Vᵀ D⁻¹
 * Eigenvalues of JᵀJ lose half the digits on flat problems; the singular values of R do not.
 * Source: Golub & Van Loan, Matrix Computations (1996), 5.5 (common practice).
 */
import { Matrix, SingularValueDecomposition } from 'ml-matrix'
import { columnNorms, triangularFactor, type TallSystem } from './triangular-factor'

export interface CovarianceEstimate {
  /** p × p, of whitened rows (unit variance); null where the problem is singular. */
  matrix: number[][] | null
  /** Largest over smallest singular value of the column-scaled Jacobian; Infinity where singular. */
  conditionNumber: number
  /** Singular values that are more than rounding. */
  rank: number
}

/** Beyond this ratio of singular values the smallest is rounding. */
const SINGULAR_BEYOND = 1e13

/**
 * Covariance of the parameters for residuals of unit variance.
 * @param system whitened Jacobian at the solution, rows ≥ columns.
 * @returns covariance and condition number; covariance null beyond a condition number of 1e13.
 * Source: Golub & Van Loan, Matrix Computations (1996), 5.5 (common practice).
 */
export function covarianceOf(system: TallSystem): CovarianceEstimate {
  const p = system.columns
  const scale = columnNorms(system)
  const { factor } = triangularFactor(system, scale)
  const decomposition = new SingularValueDecomposition(Matrix.from1DArray(p, p, Array.from(factor)), { computeLeftSingularVectors: false })
  const singular = decomposition.diagonal
  const smallest = singular[p - 1]!
  const conditionNumber = smallest > 0 ? singular[0]! / smallest : Infinity
  const rank = singular.filter((value) => value * SINGULAR_BEYOND > singular[0]!).length
  if (!(conditionNumber < SINGULAR_BEYOND)) return { matrix: null, conditionNumber, rank }
  const right = decomposition.rightSingularVectors
  const matrix: number[][] = []
  for (let i = 0; i < p; i++) {
    const row: number[] = []
    for (let j = 0; j < p; j++) {
      let sum = 0
      for (let k = 0; k < p; k++) sum += (right.get(i, k) * right.get(j, k)) / (singular[k]! * singular[k]!)
      row.push(sum / (scale[i]! * scale[j]!))
    }
    matrix.push(row)
  }
  for (let i = 0; i < p; i++) for (let j = 0; j < i; j++) matrix[i]![j] = matrix[j]![i]!
  return { matrix, conditionNumber, rank }
}
