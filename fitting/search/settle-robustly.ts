/**
 * The last step with a robust loss, Tukey's or Huber's: weights from the residuals, a full fit with these weights, and again until the weights settle.
 * The scale is taken anew in the first five rounds and then held, so that the rounds converge.
 * Source: Beaton & Tukey 1974, Technometrics 16, 147; iterated reweighting: Holland & Welsch 1977, Comm. Statistics A6, 813.
 */
import { skyProblem, skyRows } from '../models/relative-problem'
import { rowsOf, withRobustWeights, type SkyMeasure, type SkyMeasures } from '../models/sky-measure'
import type { SkyPath } from '../models/sky-path'
import { evaluateRow, rowBuffer, skyRow } from '../models/sky-rows'
import { biweight, huberWeight, robustScale, trimmedSum, type RobustScale } from '../solve/biweight'
import { solveLeastSquares } from '../solve/levenberg-marquardt'
import { computedRho, settleStarts, type SettledPath } from './settle-path'

const LARGEST_ROUNDS = 40
const SCALE_ROUNDS = 5
const ITERATIONS_EACH = 30
const WEIGHTS_SETTLED = 1e-7

/**
 * Whitened lengths without robust weights.
 * @param path any path on the sky.
 * @param values inside its domain.
 * @param measures any measures but limits.
 * @returns d, one a measure; Infinity where a direction is asked for at the primary itself.
 */
export function distancesOf(path: SkyPath, values: ArrayLike<number>, measures: readonly SkyMeasure[]): Float64Array {
  const position = new Float64Array(2 + 2 * path.parameters)
  const buffer = rowBuffer()
  path.prepare(values)
  return Float64Array.from(measures, (measure) => {
    path.at(measure.epochYr, position, false)
    const [x, y] = [position[0]!, position[1]!]
    const row = skyRow({ ...measure, robustWeight: 1 }, Math.sqrt(x * x + y * y))
    return evaluateRow(row, x, y, buffer) ? Math.sqrt(buffer.r1 * buffer.r1 + buffer.r2 * buffer.r2) : Infinity
  })
}

/** The orbit, or the one turned by 180° where that fits more of the measures: quadrants may have been chained from a wrong one. */
function betterTurned(path: SkyPath, values: ArrayLike<number>, used: readonly SkyMeasure[]): Float64Array {
  const own = Float64Array.from(values)
  const turned = own.map((value, j) => (j < 3 ? value : -value))
  return trimmedSum(distancesOf(path, turned, used)) < trimmedSum(distancesOf(path, own, used)) ? turned : own
}

/** The measures with their last weights, and one solution a start, best first. */
export interface RobustlySettled {
  measures: SkyMeasures
  solutions: SettledPath[]
}

export interface RobustLoss {
  loss: 'huber' | 'biweight'
  /** Parameters from the fourth on are the turned constants: the orbit may be turned by 180°. */
  canTurn: boolean
}

/**
 * Fits an orbit with robust weights.
 * @param path the orbit's path.
 * @param measures prepared measures.
 * @param starts best candidate first, at least one, inside the domain.
 * @param how which loss, and whether the orbit may be turned.
 * @returns weighted measures and solutions.
 */
export function settleRobustly(path: SkyPath, measures: SkyMeasures, starts: readonly ArrayLike<number>[], { loss, canTurn }: RobustLoss): RobustlySettled {
  const { used } = measures
  let values: Float64Array = canTurn ? betterTurned(path, starts[0]!, used) : Float64Array.from(starts[0]!)
  let weighted = measures
  let scale: RobustScale = { pair: 1, single: 1 }
  for (let round = 0; round < LARGEST_ROUNDS; round++) {
    const distances = distancesOf(path, values, used)
    if (round < SCALE_ROUNDS) scale = robustScale(distances, (i) => rowsOf(used[i]!) === 2)
    const weights = distances.map((d, i) => {
      const isPair = rowsOf(used[i]!) === 2
      const own = isPair ? scale.pair : scale.single
      return loss === 'huber' ? huberWeight(d, own, isPair) : biweight(d, own)
    })
    const change = weights.reduce((largest, weight, i) => Math.max(largest, Math.abs(weight - weighted.used[i]!.robustWeight)), 0)
    weighted = withRobustWeights(measures, weights)
    const rows = skyRows(weighted.used, computedRho(path, values, weighted.used))
    values = solveLeastSquares(skyProblem(path, rows), values, { maxIterations: ITERATIONS_EACH }).values
    if (round >= SCALE_ROUNDS && change <= WEIGHTS_SETTLED) break
  }
  return { measures: weighted, solutions: settleStarts(path, weighted.used, [values, ...starts.slice(1)], () => undefined) }
}
