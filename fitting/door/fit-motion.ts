/** Fits without an orbit: uniform straight motion, or a companion that does not move. */
import { atan2, hypot, RAD } from '../elementary'
import { linePath, stillPath } from '../models/relative-line'
import { aboutNights } from '../models/nights'
import { rowsOf, type SkyMeasures } from '../models/sky-measure'
import type { SkyPath } from '../models/sky-path'
import { settlePath, settleStarts, type SettledPath } from '../search/settle-path'
import type { RobustlySettled } from '../search/settle-robustly'
import { covarianceOf } from '../solve/covariance'
import type { FitResult, FitStatistics, ObserverError } from '../types'
import { elementOf, errorScale, quadraticForm, type Quantity } from '../uncertainty/error-scale'
import { lineElements, stillElements } from '../uncertainty/line-elements'
import { rmsByCoordinate, statisticsByObserver } from '../uncertainty/observer-statistics'
import { skyResidual } from '../uncertainty/sky-residuals'
import { lineStart } from '../uncertainty/straightness'
import { ENGINE_VERSION } from '../version'
import { estimatedSigma, withEstimatedErrors } from './estimated-errors'
import type { RelativeRequest } from './fit-relative'
import { publishedCovariance, SKY_UNITS } from './judge-relative'
import { settleByObserver } from './observer-errors'
import { refuse } from './refusal'
import { stopSentence } from './stop-sentence'

interface MotionModel {
  model: 'line' | 'still'
  names: string[]
  path: SkyPath
  start: number[]
}

function modelOf(request: RelativeRequest, measures: SkyMeasures, referenceEpochYr: number): MotionModel {
  const isLine = request.settings.model === 'line'
  const start = lineStart(measures.used, referenceEpochYr)
  if (start === null) refuse('too-few-measures', 'No used measure has both coordinates.', 'Add a measure with position angle and separation.')
  const least = isLine ? 2 : 1
  if (new Set(measures.used.map((measure) => measure.epochYr)).size < least) refuse('one-epoch', 'All used measures are of one epoch: nothing shows the motion.', 'Add measures of other epochs.')
  return isLine
    ? { model: 'line', names: ['x0', 'y0', 'xDot', 'yDot'], path: linePath(referenceEpochYr), start }
    : { model: 'still', names: ['x0', 'y0'], path: stillPath(), start: start.slice(0, 2) }
}

function arcOf({ used }: SkyMeasures, path: SkyPath, values: ArrayLike<number>): FitStatistics['arc'] {
  const [firstEpochYr, lastEpochYr] = [used[0]!.epochYr, used[used.length - 1]!.epochYr]
  const position = new Float64Array(2 + 2 * path.parameters)
  const thetaAt = (epochYr: number) => {
    path.prepare(values)
    path.at(epochYr, position, false)
    return hypot(position[0]!, position[1]!) > 0 ? atan2(position[1]!, position[0]!) * RAD : 0
  }
  const swept = Math.abs(thetaAt(lastEpochYr) - thetaAt(firstEpochYr))
  return { firstEpochYr, lastEpochYr, turns: null, trueAnomalyCoveredDeg: null, positionAngleCoveredDeg: Math.min(swept, 360 - swept) }
}

/** The fit with the errors that its residuals show, where errors come from them; else the fit as it is. */
function withErrorsFromResiduals(request: RelativeRequest, path: SkyPath, first: RobustlySettled): RobustlySettled & { observerErrors?: ObserverError[] } {
  const again = (measures: SkyMeasures, before: readonly SettledPath[]) => ({ measures, solutions: [settlePath(path, measures.used, before[0]!.solution.values)] })
  if (request.settings.weights === 'by-observer') return settleByObserver(first, again)
  const measures = withEstimatedErrors(first.measures, first.solutions[0]!)
  return measures === first.measures ? first : again(measures, first.solutions)
}

/**
 * Fits straight motion or rest.
 * @param request with settings.model 'line' or 'still'.
 * @param prepared measures with their errors.
 * @returns the whole result; conic and constants are null.
 * @throws RefusedRequest where the measures do not suffice.
 */
export function fitMotion(request: RelativeRequest, prepared: SkyMeasures): FitResult {
  const { used } = prepared
  if (used.length === 0) refuse('too-few-measures', 'Every measure is set aside or is a limit.', 'Use measures of at least two epochs.')
  const referenceEpochYr = (used[0]!.epochYr + used[used.length - 1]!.epochYr) / 2
  const { model, names, path, start } = modelOf(request, prepared, referenceEpochYr)
  const rowCount = used.reduce((sum, measure) => sum + rowsOf(measure), 0)
  if (rowCount < names.length) refuse('too-few-measures', `This motion has ${names.length} unknowns; ${rowCount} coordinates are used.`, 'Add measures.')
  const first = settleStarts(path, used, [start], () => undefined)[0]
  if (first === undefined) refuse('no-orbit-found', 'The motion begins at the primary itself, where a position angle has no meaning.', 'Look for mistyped values among the measures.')
  const { measures, solutions, observerErrors } = withErrorsFromResiduals(request, path, { measures: prepared, solutions: [first] })
  request.report('polishing', 1)
  const result = judgeMotion({ model, names, path, settled: solutions[0]!, measures, observerErrors, referenceEpochYr, seed: request.settings.seed ?? 1, equinox: request.settings.thetaEquinox ?? 2000 })
  request.report('judging', 1)
  return result
}

interface MotionJudgement {
  model: 'line' | 'still'
  names: string[]
  path: SkyPath
  settled: SettledPath
  measures: SkyMeasures
  observerErrors?: ObserverError[]
  referenceEpochYr: number
  seed: number
  equinox: number
}

function judgeMotion({ model, names, path, settled, measures, observerErrors, referenceEpochYr, seed, equinox }: MotionJudgement): FitResult {
  const { values, residuals: rows, jacobian, chiSquare, reason } = settled.solution
  const degreesOfFreedom = rows.length - values.length
  const { matrix, conditionNumber, rank } = covarianceOf({ rows: rows.length, columns: values.length, jacobian, residuals: rows })
  const scale = errorScale(measures.basis, chiSquare, degreesOfFreedom)
  const reducedChiSquare = degreesOfFreedom > 0 ? chiSquare / degreesOfFreedom : null
  const residuals = measures.all.map((measure) => skyResidual(measure, { path, values, covariance: matrix, scaleSquared: reducedChiSquare, carryBack: () => null }))
  const quantities: Record<string, Quantity> = model === 'line' ? lineElements(values, referenceEpochYr) : stillElements(values)
  const published = publishedCovariance(matrix, scale.published)
  const elementNames = Object.keys(quantities)
  const elementMatrix = published === null ? null : elementNames.map((a) => elementNames.map((b) => quadraticForm(published, quantities[a]!.gradient, quantities[b]!.gradient)))
  const isKnown = elementMatrix !== null && elementMatrix.every((row) => row.every((value) => value - value === 0))
  return {
    format: 1, kind: 'relative', model, engine: { version: ENGINE_VERSION, seed },
    stop: { reason: degreesOfFreedom === 0 ? 'exact' : reason, sentence: stopSentence(degreesOfFreedom === 0 ? 'exact' : reason), iterations: settled.iterations },
    conic: null,
    elements: Object.fromEntries(elementNames.map((name) => [name, elementOf(quantities[name]!, matrix, scale)])),
    nodeEquinox: equinox,
    covariance: isKnown ? { names: elementNames, matrix: elementMatrix } : null,
    constants: null,
    statistics: {
      measures: measures.all.length, used: measures.used.length, rows: rows.length, parameters: values.length, degreesOfFreedom, chiSquare, reducedChiSquare,
      rms: rmsByCoordinate(residuals, SKY_UNITS), conditionNumber: conditionNumber < Infinity ? conditionNumber : null, errorBasis: measures.basis, rank, ...(observerErrors ? { observerErrors } : estimatedSigma(measures)),
      arc: arcOf(measures, path, values),
      byObserver: statisticsByObserver(residuals, measures.all.map((measure) => measure.observer), Object.keys(SKY_UNITS)),
    },
    residuals, alternatives: [], proposals: [],
    warnings: [...aboutNights(measures.countedNights), model === 'line' ? 'Straight motion, no orbit: positions outside the arc hold only while the motion stays straight.' : 'No motion: the companion is taken to stand still.'],
    state: { model, names, values: Array.from(values), covariance: published, referenceEpochYr },
  }
}
