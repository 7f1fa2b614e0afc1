/**
 * Measures of a relative orbit made ready for the fit: sorted, with every error resolved.
 * Errors: where every used measure states its σ they are taken as stated (formal); where none does, all weigh alike: one σ in
 * arcsec, the same along and across (scaled); in a mixture the missing take the median stated (mixed). A stated σ is that of the measure
 * as given; the number of nights shapes only what was not stated.
 */
import { atan2, hypot } from '../elementary'
import { median } from '../solve/median'
import type { FitSettings, FitStatistics, RelativeMeasure } from '../types'
import { nightsFactor } from './nights'

/** One measure with its errors; positions in arcsec, x = north, y = east. */
export interface SkyMeasure {
  id: string
  observer: string
  /** How it was measured, where the request says so. */
  method: string | null
  epochYr: number
  form: 'polar' | 'rectangular' | 'theta' | 'rho' | 'limit'
  status: 'used' | 'set-aside' | 'not-fitted'
  isAmbiguous: boolean
  /** Observed θ and ρ (of a rectangular measure: computed from it); NaN where not measured. */
  thetaRad: number
  rhoArcsec: number
  north: number
  east: number
  sigmaAlong: number
  sigmaThetaRad: number
  sigmaNorth: number
  sigmaEast: number
  correlation: number
  /** Factor on 1/σ² that the request gives. */
  weight: number
  /** Factor on 1/σ² that a robust loss gives, 1 otherwise. */
  robustWeight: number
  /** σ of the mean over σ of a single night, where σ is not stated; 1 for one night. */
  nightsFactor: number
}

export type ErrorBasis = FitStatistics['errorBasis']

/** All measures of a request, sorted by epoch, observer, station, id. */
export interface SkyMeasures {
  all: SkyMeasure[]
  used: SkyMeasure[]
  basis: ErrorBasis
  /** Used measures whose number of nights shaped an error that was not stated. */
  countedNights: number
}

/** Errors of equal weight stand for this part of the median separation until the residuals tell. */
const PROVISIONAL_SIGMA_PART = 0.01
/** Separations below this say nothing about the size of an orbit, arcsec. */
export const SMALLEST_RHO_ARCSEC = 1e-9

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0
}

/**
 * Order of every sum: epoch, observer, station, id.
 * @param a first measure; a missing epoch counts as 0.
 * @param b second measure.
 * @returns negative, zero or positive, by code units and independent of locale.
 */
export function compareMeasures(
  a: { epochYr?: number; observer: string; station?: string; id: string },
  b: { epochYr?: number; observer: string; station?: string; id: string },
): number {
  return (a.epochYr ?? 0) - (b.epochYr ?? 0) || compareText(a.observer, b.observer)
    || compareText(a.station ?? '', b.station ?? '') || compareText(a.id, b.id)
}

function statusOf(measure: RelativeMeasure): SkyMeasure['status'] {
  if (measure.position.form === 'limit') return 'not-fitted'
  return measure.setAside === true ? 'set-aside' : 'used'
}

/** The measure with its stated errors; missing ones are NaN. */
function withStatedErrors(measure: RelativeMeasure): SkyMeasure {
  const { position } = measure
  const base = {
    id: measure.id, observer: measure.observer, method: measure.method ?? null, epochYr: measure.epochYr, status: statusOf(measure), isAmbiguous: false,
    thetaRad: NaN, rhoArcsec: NaN, north: NaN, east: NaN, sigmaAlong: NaN, sigmaThetaRad: NaN, sigmaNorth: NaN, sigmaEast: NaN,
    correlation: 0, weight: measure.weightFactor ?? 1, robustWeight: 1, nightsFactor: nightsFactor(measure.nights ?? 1),
  }
  if (position.form === 'limit') return { ...base, form: 'limit', rhoArcsec: position.rhoLimitArcsec }
  if (position.form === 'rectangular') {
    const { northArcsec: north, eastArcsec: east } = position
    return {
      ...base, form: 'rectangular', north, east, thetaRad: atan2(east, north), rhoArcsec: hypot(north, east),
      sigmaNorth: position.sigmaNorthArcsec ?? NaN, sigmaEast: position.sigmaEastArcsec ?? NaN, correlation: position.correlation ?? 0,
    }
  }
  const form = position.rhoArcsec === undefined ? 'theta' : position.thetaRad === undefined ? 'rho' : 'polar'
  return {
    ...base, form, thetaRad: position.thetaRad ?? NaN, rhoArcsec: position.rhoArcsec ?? NaN,
    sigmaAlong: position.sigmaRhoArcsec ?? NaN, sigmaThetaRad: position.sigmaThetaRad ?? NaN,
    correlation: form === 'polar' ? (position.correlation ?? 0) : 0, isAmbiguous: position.quadrant === 'ambiguous',
  }
}

/** The errors a measure needs for its rows, stated or NaN. */
function neededErrors(m: SkyMeasure): number[] {
  if (m.form === 'rectangular') return [m.sigmaNorth, m.sigmaEast]
  if (m.form === 'theta') return [m.sigmaThetaRad]
  if (m.form === 'rho') return [m.sigmaAlong]
  return m.form === 'polar' ? [m.sigmaAlong, m.sigmaThetaRad] : []
}

const isStated = (value: number) => value === value

/** One σ in arcsec along and across. */
function withRoundError(m: SkyMeasure, sigmaArcsec: number, medianRho: number): SkyMeasure {
  const rho = m.rhoArcsec >= SMALLEST_RHO_ARCSEC ? m.rhoArcsec : medianRho
  return { ...m, sigmaAlong: sigmaArcsec, sigmaThetaRad: sigmaArcsec / rho, sigmaNorth: sigmaArcsec, sigmaEast: sigmaArcsec, correlation: 0 }
}

/** Median stated errors of a single night, arcsec; each falls back to the other. */
function medianErrors(used: SkyMeasure[], medianRho: number): { along: number; across: number } {
  const rectangular = used.flatMap((m) => [m.sigmaNorth / m.nightsFactor, m.sigmaEast / m.nightsFactor])
  const along = median([...used.map((m) => m.sigmaAlong / m.nightsFactor), ...rectangular].filter(isStated))
  const across = median([...used.map((m) => (m.sigmaThetaRad * (m.rhoArcsec >= SMALLEST_RHO_ARCSEC ? m.rhoArcsec : medianRho)) / m.nightsFactor), ...rectangular].filter(isStated))
  return { along: isStated(along) ? along : across, across: isStated(across) ? across : along }
}

function withMissingErrors(m: SkyMeasure, errors: { along: number; across: number }, medianRho: number): SkyMeasure {
  const fill = (value: number, instead: number) => (isStated(value) ? value : instead * m.nightsFactor)
  const both = (errors.along + errors.across) / 2
  return {
    ...m,
    sigmaAlong: fill(m.sigmaAlong, errors.along),
    sigmaThetaRad: fill(m.sigmaThetaRad, errors.across / (m.rhoArcsec >= SMALLEST_RHO_ARCSEC ? m.rhoArcsec : medianRho)),
    sigmaNorth: fill(m.sigmaNorth, both),
    sigmaEast: fill(m.sigmaEast, both),
  }
}

function scaleErrors(m: SkyMeasure, factor: number): SkyMeasure {
  return {
    ...m, sigmaAlong: m.sigmaAlong * factor, sigmaThetaRad: m.sigmaThetaRad * factor,
    sigmaNorth: m.sigmaNorth * factor, sigmaEast: m.sigmaEast * factor,
  }
}

function basisOf(used: SkyMeasure[], settings: FitSettings): ErrorBasis {
  if (settings.weights === 'equal' || settings.weights === 'by-observer') return 'scaled'
  const errors = used.flatMap(neededErrors)
  const stated = errors.filter(isStated).length
  return stated === errors.length ? 'formal' : stated === 0 ? 'scaled' : 'mixed'
}

/**
 * Sorts measures and resolves their errors.
 * @param measures validated; at least one used measure with a separation.
 * @param settings weights 'stated' (default), 'equal' or 'by-observer' (both begin with one σ for all); sigmaScale multiplies every error.
 * @returns all measures and the used ones, both sorted, with the basis of their errors.
 */
export function prepareSkyMeasures(measures: readonly RelativeMeasure[], settings: FitSettings): SkyMeasures {
  const areNightsUsed = settings.weights !== 'equal'
  const stated = [...measures].sort(compareMeasures).map(withStatedErrors).map((m) => (areNightsUsed ? m : { ...m, nightsFactor: 1 }))
  const used = stated.filter((m) => m.status === 'used')
  const basis = basisOf(used, settings)
  const medianRho = median(used.map((m) => m.rhoArcsec).filter((rho) => rho >= SMALLEST_RHO_ARCSEC))
  const errors = medianErrors(used, medianRho)
  const all = stated.map((m) => {
    if (basis === 'scaled') return withRoundError(m, PROVISIONAL_SIGMA_PART * medianRho * m.nightsFactor, medianRho)
    return scaleErrors(withMissingErrors(m, errors, medianRho), settings.sigmaScale ?? 1)
  })
  const countedNights = areNightsUsed ? stated.filter((m) => m.status === 'used' && m.nightsFactor !== 1 && !neededErrors(m).every(isStated)).length : 0
  return { all, used: all.filter((m) => m.status === 'used'), basis, countedNights }
}

/**
 * Multiplies every error by a factor, as when equal errors are estimated from the residuals.
 * @param measures as prepared.
 * @param factor > 0.
 * @returns the same measures with scaled errors.
 */
export function rescaleSkyMeasures(measures: SkyMeasures, factor: number): SkyMeasures {
  const all = measures.all.map((m) => scaleErrors(m, factor))
  return { ...measures, all, used: all.filter((m) => m.status === 'used') }
}

/**
 * Gives every measure one σ along and across.
 * @param measures as prepared.
 * @param sigmaOf σ of a single night, arcsec; where it is NaN (a measure that is not used, of an unknown group) the measure stays as it is.
 * @returns the same measures with these errors, those of means of several nights being smaller.
 */
export function withGroupErrors(measures: SkyMeasures, sigmaOf: (measure: SkyMeasure) => number): SkyMeasures {
  const medianRho = median(measures.used.map((m) => m.rhoArcsec).filter((rho) => rho >= SMALLEST_RHO_ARCSEC))
  const all = measures.all.map((m) => {
    const sigma = sigmaOf(m)
    return isStated(sigma) ? withRoundError(m, sigma * m.nightsFactor, medianRho) : m
  })
  return { ...measures, all, used: all.filter((m) => m.status === 'used') }
}

/**
 * Gives every used measure its robust weight.
 * @param measures as prepared.
 * @param weights one a used measure, above 0 and up to 1.
 * @returns the same measures with these weights; measures that are not used keep 1.
 */
export function withRobustWeights(measures: SkyMeasures, weights: ArrayLike<number>): SkyMeasures {
  const used = measures.used.map((measure, i) => ({ ...measure, robustWeight: weights[i]! }))
  let next = 0
  return { ...measures, used, all: measures.all.map((measure) => (measure.status === 'used' ? used[next++]! : measure)) }
}

/**
 * Rows that a measure gives.
 * @param measure any form but a limit.
 * @returns 1 for a position angle or a separation alone, else 2.
 */
export function rowsOf(measure: SkyMeasure): 1 | 2 {
  return measure.form === 'theta' || measure.form === 'rho' ? 1 : 2
}

/**
 * Rows that the used measures give, each counted by its robust weight.
 * @param used used measures.
 * @returns a whole number.
 */
export function effectiveRows(used: readonly SkyMeasure[]): number {
  return Math.round(used.reduce((sum, measure) => sum + rowsOf(measure) * measure.robustWeight, 0))
}
