/**
 * Nonlinear least squares by Levenberg–Marquardt: minimise χ² = Σ rᵢ(x)² over x, r whitened.
 * The driver owns acceptance, damping and stopping; one step comes from damped-step.ts. The columns of J are scaled to
 * unit length at every accepted point, and [J r] is factored to p + 1 rows, so the cost of a step does not grow with rows.
 * Symbols: δ the step in scaled parameters, λ the damping (÷ 9 after an accepted step, × 11 after a rejected one),
 * predicted fall of χ² = ‖c‖² − ‖Rδ + c‖².
 * Source: Marquardt 1963, J. SIAM 11, 431; stopping tests after Moré 1978, in Numerical Analysis (ed. Watson, Springer), 105.
 */
import type { StopReason } from '../types'
import { dampedStep } from './damped-step'
import { Iterate } from './iterate'
import { sumOfSquares, type LeastSquaresProblem } from './least-squares-problem'

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
 * Source: Marquardt 1963, J. SIAM 11, 431; Moré 1978, in Numerical Analysis (ed. Watson, Springer), 105.
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
