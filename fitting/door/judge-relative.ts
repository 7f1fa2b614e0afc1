/** From the solutions of a relative fit to its result: elements, errors, residuals, alternatives, warnings. */
import type { Held } from '../models/held-orbit'
import type { RelativeForm } from '../models/relative-form'
import { LARGEST_S, RELATIVE_KEPLER_NAMES } from '../models/relative-kepler'
import { aboutNights } from '../models/nights'
import { skyProblem } from '../models/relative-problem'
import { effectiveRows, type SkyMeasures } from '../models/sky-measure'
import { isSameMinimum } from '../search/polish'
import type { SettledPath } from '../search/settle-path'
import { covarianceOf } from '../solve/covariance'
import type { Alternative, Element, FitResult, FitSettings, FitStatistics, NormalPoint, ObserverError } from '../types'
import { elementOf, errorScale, quadraticForm } from '../uncertainty/error-scale'
import { aboutFrame, frameElements, frameShift } from '../uncertainty/frame-elements'
import { aboutNormalPoints } from '../uncertainty/about-normal-points'
import { aboutHeld, markHeld, withHeldQuantities } from '../uncertainty/held-elements'
import { rmsByCoordinate, statisticsByObserver } from '../uncertainty/observer-statistics'
import { ELEMENT_NAMES, relativeElements, type RelativeElements } from '../uncertainty/relative-elements'
import { carryBackOf, combinedAngle, relativeArc, relativeConic, relativeConstants, type Errors } from '../uncertainty/relative-motion'
import { proposalsOf } from '../uncertainty/proposals'
import { profileRoots } from '../uncertainty/profile'
import { isProfileDue, relativeProfile } from '../uncertainty/relative-profile'
import { relativeWarnings } from '../uncertainty/relative-warnings'
import { skyResidual, type SkyResidualContext } from '../uncertainty/sky-residuals'
import { straightnessOf } from '../uncertainty/straightness'
import { ENGINE_VERSION } from '../version'
import { estimatedSigma } from './estimated-errors'
import { stopSentence } from './stop-sentence'

/** Coordinates whose scatter is reported. */
export const SKY_UNITS = {
  acrossArcsec: 'arcsec', alongArcsec: 'arcsec', thetaDeg: 'deg', rhoArcsec: 'arcsec', eastArcsec: 'arcsec', northArcsec: 'arcsec',
} as const

/** Arcs shorter than this part of a period are tested for being straight. */
const SHORT_ARC_TURNS = 0.5

export interface Judgement {
  /** Best first, at least one. */
  solutions: SettledPath[]
  form: RelativeForm
  measures: SkyMeasures
  referenceEpochYr: number
  settings: FitSettings
  /** Where errors were estimated by observer. */
  observerErrors?: ObserverError[]
  /** Where the fit went through normal points. */
  normalPoints?: NormalPoint[]
  alternativeWithin: number
}

/** Multiplies a covariance of unit variance to the errors that are published. */
export function publishedCovariance(matrix: number[][] | null, published: number | null): number[][] | null {
  return matrix === null || published === null ? null : matrix.map((row) => row.map((value) => value * published * published))
}

interface SolutionErrors extends Errors {
  /** Covariance of the fitted parameters; that of the regular ones is `covariance`. */
  fitted: number[][] | null
  conditionNumber: number
  rank: number
}

function errorsOf(settled: SettledPath, { measures, form }: Judgement): SolutionErrors {
  const { jacobian, residuals, values, chiSquare } = settled.solution
  const { matrix, conditionNumber, rank } = covarianceOf({ rows: residuals.length, columns: values.length, jacobian, residuals })
  return { covariance: form.regularCovariance(values, matrix), fitted: matrix, conditionNumber, rank, scale: errorScale(measures.basis, chiSquare, effectiveRows(measures.used) - values.length) }
}

/** Elements of a solution, those held with their values and without errors. */
function elementsOf(settled: SettledPath, errors: Errors, judgement: Judgement): RelativeElements {
  const { form, referenceEpochYr, measures: { used } } = judgement
  const values = form.regular(settled.solution.values)
  return withHeldQuantities(relativeElements({ values, covariance: errors.covariance, referenceEpochYr, lastEpochYr: used[used.length - 1]!.epochYr }), form.held)
}

function publishedElements(elements: RelativeElements, errors: Errors, held: Held): Record<string, Element> {
  const published: Record<string, Element> = {}
  for (const name of ELEMENT_NAMES) published[name] = elementOf(elements.quantities[name], errors.covariance, errors.scale)
  const combined = combinedAngle(elements, errors)
  if (combined !== null) published[combined.name] = combined.element
  published.nextPeriastronTime = elementOf(elements.nextPeriastron, errors.covariance, errors.scale)
  markHeld(published, held)
  return published
}

/** Covariance of the published elements, with the errors to publish; null where any is not determined. */
function elementCovariance(elements: RelativeElements, errors: Errors): FitResult['covariance'] {
  const matrix = publishedCovariance(errors.covariance, errors.scale.published)
  if (matrix === null) return null
  const gradients = ELEMENT_NAMES.map((name) => elements.quantities[name].gradient)
  const rows = gradients.map((g) => gradients.map((h) => quadraticForm(matrix, g, h)))
  return rows.every((row) => row.every((value) => value - value === 0)) ? { names: [...ELEMENT_NAMES], matrix: rows } : null
}

function alternativesOf(judgement: Judgement, scaleSquared: number): Alternative[] {
  const { solutions, form, alternativeWithin } = judgement
  const best = solutions[0]!
  const kept: SettledPath[] = []
  for (const settled of solutions.slice(1)) {
    const isNew = [best, ...kept].every((other) => !isSameMinimum(form.regular(other.solution.values), form.regular(settled.solution.values)))
    const isMinimum = settled.solution.reason !== 'iteration-limit' && settled.solution.reason !== 'singular'
    if (isNew && isMinimum && settled.solution.chiSquare - best.solution.chiSquare < alternativeWithin * scaleSquared) kept.push(settled)
  }
  return kept.map((settled) => {
    const errors = errorsOf(settled, judgement)
    const elements = elementsOf(settled, errors, judgement)
    return {
      deltaChiSquare: (settled.solution.chiSquare - best.solution.chiSquare) / scaleSquared,
      elements: publishedElements(elements, errors, form.held),
    }
  })
}

function statisticsOf(judgement: Judgement, errors: { conditionNumber: number; rank: number }, elements: RelativeElements): Omit<FitStatistics, 'rms' | 'byObserver'> {
  const { measures, solutions } = judgement
  const { chiSquare, residuals, values } = solutions[0]!.solution
  const { used } = measures
  const degreesOfFreedom = Math.max(0, effectiveRows(used) - values.length)
  return {
    measures: measures.all.length,
    used: measures.all.filter((measure) => measure.status === 'used').length,
    rows: residuals.length,
    parameters: values.length,
    degreesOfFreedom,
    chiSquare,
    reducedChiSquare: degreesOfFreedom > 0 ? chiSquare / degreesOfFreedom : null,
    conditionNumber: errors.conditionNumber < Infinity ? errors.conditionNumber : null,
    errorBasis: measures.basis,
    rank: errors.rank,
    ...(judgement.observerErrors ? { observerErrors: judgement.observerErrors } : estimatedSigma(measures)),
    arc: relativeArc(elements, used[0]!.epochYr, used[used.length - 1]!.epochYr),
  }
}

/** Profile intervals where they are due; of orbits with all seven parameters free, about the reference point itself. */
function profileOf(judgement: Judgement, errors: SolutionErrors, elements: RelativeElements, published: Record<string, Element>): FitResult['profile'] {
  const { solutions, form, settings, referenceEpochYr, measures } = judgement
  const { solution, rows } = solutions[0]!
  const roots = profileRoots(errors.scale, effectiveRows(measures.used) - solution.values.length)
  if (!form.isRegular || form.frame !== 'none' || errors.covariance === null || roots === null || !isProfileDue(settings.errors, solution.residuals.length, published.period, errors.conditionNumber)) return undefined
  return relativeProfile({ ...solution, problem: skyProblem(form.path, rows), covariance: errors.covariance, roots }, elements, referenceEpochYr)
}

/**
 * Judges a relative fit.
 * @param judgement solutions best first, measures with their errors, reference epoch (Julian year).
 * @returns the result that leaves the door.
 */
export function judgeRelative(judgement: Judgement): FitResult {
  const { solutions, form, measures, referenceEpochYr, settings } = judgement
  const { solution, iterations } = solutions[0]!
  const { used } = measures
  const errors = errorsOf(solutions[0]!, judgement)
  const elements = elementsOf(solutions[0]!, errors, judgement)
  const regular = form.regular(solution.values)
  const frame = { frame: form.frame, frameFrom: form.frameFrom, fitted: solution.values, covariance: errors.fitted, scale: errors.scale }
  const partial = statisticsOf(judgement, errors, elements)
  const context: SkyResidualContext = {
    path: form.path, values: solution.values, covariance: errors.fitted,
    scaleSquared: partial.reducedChiSquare, carryBack: carryBackOf(elements),
  }
  const shiftAt = frameShift(frame, referenceEpochYr)
  const residuals = measures.all.map((measure) => {
    const shift = shiftAt(measure.epochYr)
    return skyResidual(measure, { ...context, carryBack: (north, east) => context.carryBack(north - shift.north, east - shift.east) })
  })
  const statistics: FitStatistics = {
    ...partial,
    rms: rmsByCoordinate(residuals, SKY_UNITS),
    byObserver: statisticsByObserver(residuals, measures.all.map((measure) => measure.observer), Object.keys(SKY_UNITS)),
  }
  const conic = relativeConic(elements, errors)
  const published = { ...publishedElements(elements, errors, form.held), ...frameElements(frame) }
  const alternatives = alternativesOf(judgement, Math.max(1, partial.reducedChiSquare ?? 1))
  const isAtLimit = form.held.eccentricity === undefined && regular[1]! * regular[1]! + regular[2]! * regular[2]! > 0.95 * LARGEST_S * LARGEST_S
  const isShortArc = isAtLimit || (statistics.arc.turns ?? 0) < SHORT_ARC_TURNS
  const straightness = isShortArc && form.frame === 'none' ? straightnessOf(measures, referenceEpochYr) : undefined
  const profile = profileOf(judgement, errors, elements, published)
  return {
    format: 1,
    kind: 'relative',
    model: 'kepler',
    engine: { version: ENGINE_VERSION, seed: settings.seed ?? 1 },
    stop: { reason: solution.reason, sentence: stopSentence(solution.reason), iterations },
    conic,
    elements: published,
    nodeStatus: 'ambiguous',
    nodeEquinox: settings.thetaEquinox ?? 2000,
    covariance: elementCovariance(elements, errors),
    ...(profile === undefined ? {} : { profile }),
    constants: relativeConstants(elements, errors, used.map((measure) => measure.epochYr)),
    statistics,
    residuals,
    ...(judgement.normalPoints ? { normalPoints: judgement.normalPoints } : {}),
    alternatives,
    proposals: settings.loss === 'biweight' ? proposalsOf(measures.used, residuals, context) : [],
    warnings: [
      ...relativeWarnings({ elements, published, errors, conic, statistics, residuals, alternatives, isAtLimit, hasProfile: profile !== undefined, straightness }),
      ...aboutHeld(form.held), ...aboutFrame(form.frame, referenceEpochYr), ...aboutNights(measures.countedNights), ...aboutNormalPoints(judgement.normalPoints, used.length),
    ],
    state: {
      model: 'kepler', names: [...RELATIVE_KEPLER_NAMES], values: Array.from(regular),
      covariance: publishedCovariance(errors.covariance, errors.scale.published), referenceEpochYr,
    },
  }
}
