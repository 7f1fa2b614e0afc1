/**
 * Nonlinear least squares by Levenberg–Marquardt: minimise χ² = Σ rᵢ(x)² over x, r whitened.
 * The driver owns acceptance, damping and stopping; one step comes from damped-step.ts. The columns of J are scaled to
 * unit length at every accepted point, and [J r] is factored to p + 1 rows, so the cost of a step does not grow with rows.
 * Symbols: δ the step in scaled parameters, λ the damping (÷ 9 after an accepted step, × 11 after a rejected one),
 * predicted fall of χ² = ‖c‖² − ‖Rδ + c‖².
 * Source: Marquardt 1963, J. SIAM 11, 431; stopping tests after Moré 1978, Lecture Notes in Mathematics 630, 105.
 */
import type { StopReason } from '../types'
import { dampedStep } from './damped-step'
import { columnNorms, triangularFactor, type TriangularFactor } from './triangular-factor'

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

export interface SolverSettings {
  maxIterations?: number
  /** Stop when actual and predicted relative fall of χ² are below this. */
  chiSquareTolerance?: number
  /** Stop when the scaled step is below this part of the scaled parameters. */
  stepTolerance?: number
  /** Stop when no column of J makes a larger cosine with r than this. */
  gradientTolerance?: number
  initialDamping?: number
}

export interface Solution {
  values: Float64Array
  chiSquare: number
  residuals: Float64Array
  jacobian: Float64Array
  reason: StopReason
  iterations: number
}

const DEFAULTS: Required<SolverSettings> = {
  maxIterations: 200,
  chiSquareTolerance: 1e-14,
  stepTolerance: 1e-13,
  gradientTolerance: 1e-12,
  initialDamping: 1e-3,
}
const DAMPING_FALL = 9
const DAMPING_RISE = 11
const SMALLEST_DAMPING = 1e-12
const LARGEST_DAMPING = 1e12

function sumOfSquares(values: Float64Array): number {
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

/** The accepted point with its linearisation. */
class Iterate {
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

function stepLength(step: ArrayLike<number>): number {
  let sum = 0
  for (let j = 0; j < step.length; j++) sum += step[j]! * step[j]!
  return Math.sqrt(sum)
}

interface Trial {
  values: Float64Array
  chiSquare: number
  step: number[]
}

/** One trial from the point with the given damping; χ² is Infinity outside the domain. */
function takeTrial(problem: LeastSquaresProblem, point: Iterate, damping: number, scratch: Float64Array): Trial {
  const values = new Float64Array(problem.parameters)
  let chiSquare = Infinity
  const step = dampedStep(point.reduced, damping, (scaledStep) => {
    for (let j = 0; j < values.length; j++) values[j] = point.values[j]! + scaledStep[j]! / point.scale[j]!
    chiSquare = problem.evaluate(values, scratch, null) ? sumOfSquares(scratch) : Infinity
    if (!(chiSquare < Infinity)) chiSquare = Infinity
    return chiSquare
  })
  return { values, chiSquare, step }
}

/** Why to stop after this trial, or null to go on. */
function reasonToStop(point: Iterate, trial: Trial, damping: number, limits: Required<SolverSettings>): StopReason | null {
  const predicted = point.predictedFall(trial.step)
  const actual = point.chiSquare - trial.chiSquare
  const floor = limits.chiSquareTolerance * point.chiSquare
  if (predicted <= floor && actual <= floor * 4) return 'chi-square-settled'
  if (stepLength(trial.step) <= limits.stepTolerance * point.scaledLength()) return 'step-settled'
  if (damping >= LARGEST_DAMPING) return predicted <= 1e-8 * point.chiSquare ? 'chi-square-settled' : 'singular'
  return null
}

/**
 * Minimises χ² from a start inside the domain.
 * @param problem whitened residuals and Jacobian, rows ≥ parameters.
 * @param start one value a parameter.
 * @param settings limits; each has a default.
 * @returns the best point met, its χ², residuals and Jacobian there, and why the solver stopped.
 * @throws RangeError where the model is not defined at the start (a programmer's error).
 * Source: Marquardt 1963, J. SIAM 11, 431; Moré 1978, Lecture Notes in Mathematics 630, 105.
 */
export function solveLeastSquares(problem: LeastSquaresProblem, start: ArrayLike<number>, settings: SolverSettings = {}): Solution {
  const limits = { ...DEFAULTS, ...settings }
  const scratch = new Float64Array(problem.rows)
  let point = new Iterate(problem, Float64Array.from(start))
  if (!point.linearise()) throw new RangeError('The start of a least-squares problem lies outside the domain of its model.')
  let damping = limits.initialDamping
  let reason: StopReason | null = null
  let iterations = 0
  for (; reason === null && iterations < limits.maxIterations; iterations++) {
    if (point.gradientCosine() <= limits.gradientTolerance) {
      reason = 'gradient-settled'
      break
    }
    const trial = takeTrial(problem, point, damping, scratch)
    reason = reasonToStop(point, trial, damping, limits)
    if (trial.chiSquare < point.chiSquare) {
      const next = new Iterate(problem, trial.values)
      if (next.linearise()) point = next
      damping = Math.max(damping / DAMPING_FALL, SMALLEST_DAMPING)
    } else {
      damping = Math.min(damping * DAMPING_RISE, LARGEST_DAMPING)
    }
  }
  const { values, chiSquare, residuals, jacobian } = point
  return { values, chiSquare, residuals, jacobian, reason: reason ?? 'iteration-limit', iterations }
}
