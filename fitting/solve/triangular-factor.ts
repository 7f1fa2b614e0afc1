/**
 * QR factor of a tall matrix by Householder reflections, keeping only what least squares needs.
 *   [J r] = Q [R c], R upper triangular p × p, c = Qᵀr of p + 1 entries, the last the length left over.
 * ‖J δ + r‖ = ‖R δ + c‖ for every δ, so p + 1 rows stand for any number of rows.
 * Source: Golub & Van Loan, Matrix Computations (1996), 5.2 and 5.3 (common practice).
 */

export interface TriangularFactor {
  /** Row-major p × p, upper triangular. */
  factor: Float64Array
  /** p + 1 entries; the last is ≥ 0. */
  rotated: Float64Array
}

/** A matrix in row-major order with its residual vector beside it. */
export interface TallSystem {
  rows: number
  columns: number
  /** Row-major rows × columns; left unchanged. */
  jacobian: Float64Array
  /** rows entries; left unchanged. */
  residuals: Float64Array
}

/** Copies [J·D⁻¹ r] column by column, so that the reflections run along memory. */
function copyByColumns(system: TallSystem, columnScale: Float64Array): Float64Array {
  const { rows, columns, jacobian, residuals } = system
  const work = new Float64Array(rows * (columns + 1))
  for (let j = 0; j < columns; j++) {
    const inverse = 1 / columnScale[j]!
    for (let i = 0; i < rows; i++) work[j * rows + i] = jacobian[i * columns + j]! * inverse
  }
  for (let i = 0; i < rows; i++) work[columns * rows + i] = residuals[i]!
  return work
}

/** Reflects column j to zero below row j, and every later column with it. */
function reflect(work: Float64Array, rows: number, j: number, last: number): void {
  const start = j * rows
  let sum = 0
  for (let i = j; i < rows; i++) sum += work[start + i]! * work[start + i]!
  if (sum === 0) return
  const head = work[start + j]!
  const length = Math.sqrt(sum)
  const target = head > 0 ? -length : length
  work[start + j] = head - target
  const factor = 1 / (length * (length + Math.abs(head)))
  for (let k = j + 1; k <= last; k++) {
    const column = k * rows
    let dot = 0
    for (let i = j; i < rows; i++) dot += work[start + i]! * work[column + i]!
    const scale = dot * factor
    for (let i = j; i < rows; i++) work[column + i] = work[column + i]! - scale * work[start + i]!
  }
  work[start + j] = target
}

/**
 * Factors the column-scaled Jacobian with its residuals to p + 1 rows.
 * @param system rows × columns with rows ≥ columns; whitened.
 * @param columnScale divisor of each column, > 0, one a column.
 * @returns R of J·D⁻¹ and c = Qᵀr.
 * Source: Golub & Van Loan, Matrix Computations (1996), 5.2 (common practice).
 */
export function triangularFactor(system: TallSystem, columnScale: Float64Array): TriangularFactor {
  const { rows, columns } = system
  const work = copyByColumns(system, columnScale)
  for (let j = 0; j < columns; j++) reflect(work, rows, j, columns)
  const factor = new Float64Array(columns * columns)
  const rotated = new Float64Array(columns + 1)
  for (let j = 0; j < columns; j++) {
    for (let i = 0; i <= j; i++) factor[i * columns + j] = work[j * rows + i]!
    rotated[j] = work[columns * rows + j]!
  }
  let rest = 0
  for (let i = columns; i < rows; i++) rest += work[columns * rows + i]! * work[columns * rows + i]!
  rotated[columns] = Math.sqrt(rest)
  return { factor, rotated }
}

/**
 * Euclidean norms of the columns, the scale that makes the factor well balanced.
 * @param system rows × columns.
 * @returns one norm a column; a column of zeros gets 1, so that it can be divided by.
 */
export function columnNorms(system: TallSystem): Float64Array {
  const { rows, columns, jacobian } = system
  const norms = new Float64Array(columns)
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) norms[j] = norms[j]! + jacobian[i * columns + j]! * jacobian[i * columns + j]!
  }
  for (let j = 0; j < columns; j++) norms[j] = norms[j]! > 0 ? Math.sqrt(norms[j]!) : 1
  return norms
}
