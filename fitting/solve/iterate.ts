/** A point of the solver with everything that its next step needs: residuals, Jacobian, χ², and the p + 1 rows that stand for them. */
import { sumOfSquares, type LeastSquaresProblem } from './least-squares-problem'
import { columnNorms, triangularFactor, type TriangularFactor } from './triangular-factor'

/** The accepted point with its linearisation. */
export class Iterate {
  readonly residuals: Float64Array
  readonly jacobian: Float64Array
  chiSquare = Infinity
  scale: Float64Array = new Float64Array(0)
  reduced: TriangularFactor = { factor: new Float64Array(0), rotated: new Float64Array(0) }

  constructor(
    private readonly problem: LeastSquaresProblem,
    readonly values: Float64Array,
  ) {
    this.residuals = new Float64Array(problem.rows)
    this.jacobian = new Float64Array(problem.rows * problem.parameters)
  }

  /** Evaluates residuals and Jacobian here; false outside the domain. */
  linearise(): boolean {
    const { problem } = this
    if (!problem.evaluate(this.values, this.residuals, this.jacobian)) return false
    this.chiSquare = sumOfSquares(this.residuals)
    if (!(this.chiSquare < Infinity)) return false
    const system = { rows: problem.rows, columns: problem.parameters, jacobian: this.jacobian, residuals: this.residuals }
    this.scale = columnNorms(system)
    this.reduced = triangularFactor(system, this.scale)
    return true
  }

  /** Largest cosine between r and a column of J. */
  gradientCosine(): number {
    const { factor, rotated } = this.reduced
    const p = rotated.length - 1
    const length = Math.sqrt(this.chiSquare)
    let largest = 0
    for (let j = 0; j < p; j++) {
      let dot = 0
      for (let i = 0; i <= j; i++) dot += factor[i * p + j]! * rotated[i]!
      largest = Math.max(largest, Math.abs(dot))
    }
    return length > 0 ? largest / length : 0
  }

  /** Predicted fall of χ² for a scaled step. */
  predictedFall(step: ArrayLike<number>): number {
    const { factor, rotated } = this.reduced
    const p = rotated.length - 1
    let before = 0
    let after = 0
    for (let i = 0; i < p; i++) {
      let row = rotated[i]!
      for (let j = i; j < p; j++) row += factor[i * p + j]! * step[j]!
      after += row * row
      before += rotated[i]! * rotated[i]!
    }
    return before - after
  }

  scaledLength(): number {
    let sum = 0
    for (let j = 0; j < this.values.length; j++) {
      const scaled = this.values[j]! * this.scale[j]!
      sum += scaled * scaled
    }
    return Math.sqrt(sum)
  }
}
