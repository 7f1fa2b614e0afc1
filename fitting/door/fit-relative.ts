/** The relative orbit from request to result: errors, search or refit, solution, judgement. */
import { exp } from '../elementary'
import { relativeForm, type RelativeForm } from '../models/relative-form'
import { RELATIVE_KEPLER_NAMES } from '../models/relative-kepler'
import { atOneEquinox } from '../models/theta-equinox'
import { effectiveRows, prepareSkyMeasures, rowsOf, SMALLEST_RHO_ARCSEC, type SkyMeasure, type SkyMeasures } from '../models/sky-measure'
import { searchRelative, type SearchRequest } from '../search/blind-search'
import { withNormalPoints } from '../search/normal-points'
import { searchHeld } from '../search/held-search'
import { searchRobustly } from '../search/robust-search'
import { preferredSolution } from '../search/prefer-longer'
import { settlePath, settleStarts, type SettledPath } from '../search/settle-path'
import { settleRobustly, type RobustlySettled } from '../search/settle-robustly'
import type { FitResult, FitSettings, FitStart, NormalPoint, ObserverError, RelativeMeasure } from '../types'
import { withEstimatedErrors } from './estimated-errors'
import { fitMotion } from './fit-motion'
import { judgeRelative } from './judge-relative'
import { settleByObserver } from './observer-errors'
import type { Report } from './progress'
import { refuse } from './refusal'
import { refuseUnplaced, validateEquinoxes } from './validate-equinox'
import { heldOfRelative } from './validate-held'
import { validateRelative } from './validate-measures'

const LEAST_EPOCHS = 4
/** Epochs closer than this are one (3 s). */
const SAME_EPOCH_YR = 1e-7
const DEFAULT_SHORTEST_PERIOD_YR = 0.5
/** Minima are alternatives up to this much above the best, in units of the reduced χ² where that is above 1. */
const ALTERNATIVE_WITHIN = 9
const ALTERNATIVES_AT_MOST = 8
const NORMAL_POINT_PASSES = 2
/** The search ranks with rows linearised about the observed ρ; this factor keeps what that may have moved. */
const SEARCH_MARGIN = 1.2

export interface RelativeRequest {
  measures: RelativeMeasure[]
  settings: FitSettings
  start?: FitStart
  report: Report
}

interface Middle {
  referenceEpochYr: number
  spanYr: number
}

/** Epoch about which phases and motions are least correlated: the middle of the arc. */
function middleOf(measures: SkyMeasures): Middle {
  if (measures.used.length === 0) refuse('too-few-measures', 'Every measure is set aside or is a limit.', 'Use measures of at least four epochs.')
  const first = measures.used[0]!.epochYr
  const last = measures.used[measures.used.length - 1]!.epochYr
  return { referenceEpochYr: (first + last) / 2, spanYr: last - first }
}

/** Epochs that lie apart; measures are sorted. */
function distinctEpochs(used: readonly SkyMeasure[]): number {
  return used.filter((measure, i) => i === 0 || measure.epochYr - used[i - 1]!.epochYr > SAME_EPOCH_YR).length
}

function checkEnough(measures: SkyMeasures, { path: { parameters } }: RelativeForm): void {
  const { used } = measures
  const rows = used.reduce((sum, measure) => sum + rowsOf(measure), 0)
  const epochs = distinctEpochs(used)
  if (epochs === 1) refuse('one-epoch', 'All used measures are of one epoch: nothing shows the motion.', 'Add measures of other epochs.')
  if (rows < parameters || epochs < Math.min(LEAST_EPOCHS, Math.floor((parameters + 2) / 2))) {
    refuse('too-few-measures', `An orbit has ${parameters} unknowns; ${rows} coordinates of ${epochs} epochs are used.`, 'Use at least four measures of θ and ρ at four epochs, or fit a straight line.')
  }
  if (!used.some((measure) => measure.rhoArcsec >= SMALLEST_RHO_ARCSEC)) refuse('too-few-measures', 'No used measure has a separation: the size of the orbit is open.', 'Add at least one separation.')
  if (!used.some((measure) => measure.form !== 'rho')) refuse('too-few-measures', 'No used measure has a position angle: the orientation of the orbit is open.', 'Add position angles.')
}

function searchRequest(request: RelativeRequest, measures: SkyMeasures, middle: Middle): SearchRequest {
  const degrees = Math.max(1, effectiveRows(measures.used) - RELATIVE_KEPLER_NAMES.length)
  return {
    measures: measures.used, ...middle,
    shortestPeriodYr: request.settings.shortestPeriodYr ?? DEFAULT_SHORTEST_PERIOD_YR,
    keepWithin: (best) => SEARCH_MARGIN * (best + ALTERNATIVE_WITHIN * Math.max(1, best / degrees)),
    onProgress: (part) => request.report('searching', part),
  }
}

const isRobust = ({ settings }: RelativeRequest) => settings.loss === 'biweight' || settings.loss === 'huber'

/** Regular orbits to start from. */
function regularStarts(request: RelativeRequest, measures: SkyMeasures, middle: Middle, { held }: RelativeForm): ArrayLike<number>[] {
  if (request.start) return [request.start.state.values]
  const search = searchRequest(request, measures, middle)
  if (held.period !== undefined || held.eccentricity !== undefined || held.periastronTime !== undefined) return searchHeld(search, held)
  const minima = request.settings.loss === 'biweight' ? searchRobustly(search, request.settings.seed ?? 1) : searchRelative(search)
  return minima.slice(0, ALTERNATIVES_AT_MOST + 1).map((minimum) => minimum.values)
}

/** Solutions of all starts, the one to publish first, with the weights of a robust loss in the measures. */
function settleAll(request: RelativeRequest, form: RelativeForm, measures: SkyMeasures, starts: ArrayLike<number>[]): RobustlySettled {
  const { path, isRegular } = form
  const { loss } = request.settings
  let settled: RobustlySettled = { measures, solutions: [] }
  if (loss === 'huber' || !isRobust(request)) settled = { measures, solutions: settleStarts(path, measures.used, starts, (part) => request.report('polishing', part)) }
  if ((loss === 'huber' || loss === 'biweight') && starts.length > 0) {
    const best = settled.solutions.length > 0 ? settled.solutions.map(({ solution }) => solution.values) : starts
    settled = settleRobustly(path, measures, best, { loss, canTurn: loss === 'biweight' && isRegular })
  }
  const best = settled.solutions[0]
  if (best === undefined || !isRegular) return settled
  const preferred = preferredSolution(settled.solutions, effectiveRows(settled.measures.used) - path.parameters)
  if (preferred === best) return settled
  const others = settled.solutions.filter((solution) => solution !== preferred)
  return { measures: settled.measures, solutions: [settlePath(path, settled.measures.used, preferred.solution.values), ...others] }
}

/** The fit with the errors that its residuals show, where errors come from them; else the fit as it is. */
function withErrorsFromResiduals(request: RelativeRequest, form: RelativeForm, provisional: RobustlySettled): RobustlySettled & { observerErrors?: ObserverError[] } {
  const again = (measures: SkyMeasures, before: readonly SettledPath[]) => settleAll(request, form, measures, before.map((settled) => settled.solution.values))
  if (request.settings.weights === 'by-observer') return settleByObserver(provisional, again)
  const estimated = withEstimatedErrors(provisional.measures, provisional.solutions[0]!)
  return estimated === provisional.measures ? provisional : again(estimated, provisional.solutions)
}

/** The same orbits through normal points; the points follow the orbit once more, so that the provisional one leaves no trace. */
function throughNormalPoints(form: RelativeForm, fit: RobustlySettled): RobustlySettled & { normalPoints: NormalPoint[] } {
  const periodYr = exp(form.regular(fit.solutions[0]!.solution.values)[0]!)
  let { measures, solutions } = fit
  let normalPoints: NormalPoint[] = []
  for (let pass = 0; pass < NORMAL_POINT_PASSES; pass++) {
    const pointed = withNormalPoints(fit.measures, { path: form.path, values: solutions[0]!.solution.values, periodYr })
    if (pointed.measures.used.reduce((sum, measure) => sum + rowsOf(measure), 0) < form.path.parameters) {
      refuse('too-few-measures', 'Fewer normal points are left than the orbit needs: the measures stand too close together.', 'Fit the single measures.')
    }
    normalPoints = pointed.points
    measures = pointed.measures
    solutions = settleStarts(form.path, measures.used, solutions.map(({ solution }) => solution.values), () => undefined)
  }
  return { measures, solutions, normalPoints }
}

/**
 * Fits a relative orbit, straight motion or rest.
 * @param request with checked list and settings.
 * @returns the whole result.
 * @throws RefusedRequest where values are out of range or the measures do not suffice.
 */
export function fitRelative(request: RelativeRequest): FitResult {
  validateRelative(request.measures)
  validateEquinoxes(request.measures, request.settings)
  const { measures, unplaced, sentences } = atOneEquinox(request.measures, request.settings)
  refuseUnplaced(unplaced)
  const result = fitAtOneEquinox({ ...request, measures })
  return { ...result, warnings: [...result.warnings, ...sentences] }
}

function fitAtOneEquinox(request: RelativeRequest): FitResult {
  const held = heldOfRelative(request.settings)
  const prepared = prepareSkyMeasures(request.measures, request.settings)
  request.report('reading', 1)
  if (request.settings.model === 'line' || request.settings.model === 'still') return fitMotion(request, prepared)
  const middle = middleOf(prepared)
  const referenceEpochYr = request.start?.state.referenceEpochYr ?? middle.referenceEpochYr
  const form = relativeForm(held, request.settings.frameOffset ?? 'none', referenceEpochYr)
  checkEnough(prepared, form)
  const starts = regularStarts(request, prepared, middle, form).flatMap((start) => form.starts(start))
  const provisional = settleAll(request, form, prepared, starts)
  if (provisional.solutions.length === 0) refuse('no-orbit-found', 'The search found no orbit for these measures.', 'Look for changed quadrants and mistyped epochs, or fit a straight line.')
  const errors = withErrorsFromResiduals(request, form, provisional)
  const { measures, solutions, normalPoints } = request.settings.normalPoints ? throughNormalPoints(form, errors) : { ...errors, normalPoints: undefined }
  const result = judgeRelative({ solutions, form, measures, observerErrors: errors.observerErrors, normalPoints, referenceEpochYr, settings: request.settings, alternativeWithin: ALTERNATIVE_WITHIN })
  request.report('judging', 1)
  return result
}
