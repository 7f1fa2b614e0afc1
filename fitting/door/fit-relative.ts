/** The relative orbit from request to result: errors, search or refit, solution, judgement. */
import { keplerPath, RELATIVE_KEPLER_NAMES } from '../models/relative-kepler'
import { prepareSkyMeasures, rescaleSkyMeasures, SMALLEST_RHO_ARCSEC, type SkyMeasure, type SkyMeasures } from '../models/sky-measure'
import { searchRelative } from '../search/blind-search'
import { settleStarts, type SettledPath } from '../search/settle-path'
import type { FitResult, FitSettings, FitStart, RelativeMeasure } from '../types'
import { fitMotion } from './fit-motion'
import { judgeRelative } from './judge-relative'
import type { Report } from './progress'
import { refuse } from './refusal'
import { validateRelative } from './validate-measures'

const LEAST_ROWS = 7
const LEAST_EPOCHS = 4
/** Epochs closer than this are one (3 s). */
const SAME_EPOCH_YR = 1e-7
const DEFAULT_SHORTEST_PERIOD_YR = 0.5
/** Minima are alternatives up to this much above the best, in units of the reduced χ² where that is above 1. */
const ALTERNATIVE_WITHIN = 9
const ALTERNATIVES_AT_MOST = 8
/** The search ranks with rows linearised about the observed ρ; this factor keeps what that may have moved. */
const SEARCH_MARGIN = 1.2

export interface RelativeRequest {
  measures: RelativeMeasure[]
  settings: FitSettings
  start?: FitStart
  report: Report
}

/** Epoch about which phases and motions are least correlated: the middle of the arc. */
function middleOf(measures: SkyMeasures): { referenceEpochYr: number; spanYr: number } {
  const first = measures.used[0]!.epochYr
  const last = measures.used[measures.used.length - 1]!.epochYr
  return { referenceEpochYr: (first + last) / 2, spanYr: last - first }
}

/** Epochs that lie apart; measures are sorted. */
function distinctEpochs(used: readonly SkyMeasure[]): number {
  return used.filter((measure, i) => i === 0 || measure.epochYr - used[i - 1]!.epochYr > SAME_EPOCH_YR).length
}

function checkEnough(measures: SkyMeasures): void {
  const { used } = measures
  const rows = used.reduce((sum, measure) => sum + (measure.form === 'theta' || measure.form === 'rho' ? 1 : 2), 0)
  const epochs = distinctEpochs(used)
  if (used.length === 0) refuse('too-few-measures', 'Every measure is set aside or is a limit.', 'Use measures of at least four epochs.')
  if (epochs === 1) refuse('one-epoch', 'All used measures are of one epoch: nothing shows the motion.', 'Add measures of other epochs.')
  if (rows < LEAST_ROWS || epochs < LEAST_EPOCHS) {
    refuse('too-few-measures', `An orbit has 7 unknowns; ${rows} coordinates of ${epochs} epochs are used.`, 'Use at least four measures of θ and ρ at four epochs, or fit a straight line.')
  }
  if (!used.some((measure) => measure.rhoArcsec >= SMALLEST_RHO_ARCSEC)) refuse('too-few-measures', 'No used measure has a separation: the size of the orbit is open.', 'Add at least one separation.')
  if (!used.some((measure) => measure.form !== 'rho')) refuse('too-few-measures', 'No used measure has a position angle: the orientation of the orbit is open.', 'Add position angles.')
}

function startsOf(request: RelativeRequest, measures: SkyMeasures, referenceEpochYr: number, spanYr: number): ArrayLike<number>[] {
  const { start, settings, report } = request
  if (start) return [start.state.values]
  const degrees = Math.max(1, 2 * measures.used.length - RELATIVE_KEPLER_NAMES.length)
  const minima = searchRelative({
    measures: measures.used, referenceEpochYr, spanYr,
    shortestPeriodYr: settings.shortestPeriodYr ?? DEFAULT_SHORTEST_PERIOD_YR,
    keepWithin: (best) => SEARCH_MARGIN * (best + ALTERNATIVE_WITHIN * Math.max(1, best / degrees)),
    onProgress: (part) => report('searching', part),
  })
  return minima.slice(0, ALTERNATIVES_AT_MOST + 1).map((minimum) => minimum.values)
}

/** Equal errors take the size that the residuals show; noise-free residuals leave them as they are. */
function withEstimatedErrors(measures: SkyMeasures, best: SettledPath): SkyMeasures {
  const { chiSquare, residuals, values } = best.solution
  const degrees = residuals.length - values.length
  const factor = degrees > 0 ? Math.sqrt(chiSquare / degrees) : 0
  return measures.basis === 'scaled' && factor > 1e-9 ? rescaleSkyMeasures(measures, factor) : measures
}

/**
 * Fits a relative orbit, straight motion or rest.
 * @param request with checked list and settings.
 * @returns the whole result.
 * @throws RefusedRequest where values are out of range or the measures do not suffice.
 */
export function fitRelative(request: RelativeRequest): FitResult {
  validateRelative(request.measures)
  const prepared = prepareSkyMeasures(request.measures, request.settings)
  request.report('reading', 1)
  if (request.settings.model === 'line' || request.settings.model === 'still') return fitMotion(request, prepared)
  checkEnough(prepared)
  const middle = middleOf(prepared)
  const referenceEpochYr = request.start?.state.referenceEpochYr ?? middle.referenceEpochYr
  const starts = startsOf(request, prepared, referenceEpochYr, middle.spanYr)
  const provisional = settleStarts(keplerPath(referenceEpochYr), prepared.used, starts, (part) => request.report('polishing', part))
  if (provisional.length === 0) refuse('no-orbit-found', 'The search found no orbit for these measures.', 'Look for changed quadrants and mistyped epochs, or fit a straight line.')
  const measures = withEstimatedErrors(prepared, provisional[0]!)
  const solutions = measures === prepared ? provisional
    : settleStarts(keplerPath(referenceEpochYr), measures.used, provisional.map((settled) => settled.solution.values), () => undefined)
  const result = judgeRelative({ solutions, measures, referenceEpochYr, settings: request.settings, alternativeWithin: ALTERNATIVE_WITHIN })
  request.report('judging', 1)
  return result
}
