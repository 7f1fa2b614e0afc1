import type { FitResult, Prediction } from '../../fitting/types'
import { julianEpochFromJd } from '../../fitting/time'
import { roundStep } from './axis-ticks'
import type { PredictedSigma, ResidualSubject } from './residual-series'
import { trackDates, trackSpan } from './track-dates'

const RADIANS_PER_DEGREE = Math.PI / 180
const SAMPLES = 80
/** How far past now the band and the marked years reach, as a part of the span of the measures. */
const AHEAD = 0.25
const MARKED_YEARS = 5
/** Marked years stand about this part of a period apart. */
const MARK_STEP_TURNS = 1 / 15

/**
 * Where the prediction's σ is asked for along the axis of the residual plots.
 * @param result a finished fit.
 * @param subjects its measures.
 * @param nowYr Julian year now.
 * @returns Julian years from the first measure to past now; for `equatorial` Julian dates from the first measure to some weeks past the
 * last; for `plane` directions, degrees, once around.
 */
export function sampledEpochsYr(result: FitResult, subjects: readonly ResidualSubject[], nowYr: number): number[] {
  if (result.kind === 'plane') return Array.from({ length: SAMPLES + 1 }, (_, index) => (360 * index) / SAMPLES)
  if (result.kind === 'equatorial') {
    const span = trackSpan(result)
    return span ? trackDates(span) : []
  }
  const epochs = subjects.flatMap(subject => (subject.epochYr === null ? [] : [subject.epochYr]))
  if (epochs.length === 0) return []
  const first = epochs.reduce((a, b) => Math.min(a, b))
  const last = Math.max(nowYr, epochs.reduce((a, b) => Math.max(a, b)))
  const end = last + Math.max(1, (last - first) * AHEAD)
  return Array.from({ length: SAMPLES + 1 }, (_, index) => first + ((end - first) * index) / SAMPLES)
}

/**
 * σ of predictions by the names the residuals use: across is ρ σ_θ, along is σ_ρ.
 * @param predictions from the engine.
 * @param diameterScaleArcmin the diameter at r = 1 where diameters were measured: σ_d = scale σ_r / r².
 * @returns one entry a prediction, with the σ that are known, at the Julian year or direction.
 */
export function predictedSigmas(predictions: readonly Prediction[], diameterScaleArcmin: number | null = null): PredictedSigma[] {
  return predictions.map(({ at, values, sigmas }) => ({
    at: values.raDeg === undefined ? at : julianEpochFromJd(at),
    sigmas: byResidualName(values, sigmas, diameterScaleArcmin),
  }))
}

function byResidualName(values: Record<string, number>, sigmas: Prediction['sigmas'], diameterScaleArcmin: number | null): Record<string, number> {
  const { thetaDeg, rhoArcsec, ...others } = sigmas
  const named: Record<string, number | null | undefined> = { ...others }
  if (typeof thetaDeg === 'number') named.acrossArcsec = (values.rhoArcsec ?? 0) * thetaDeg * RADIANS_PER_DEGREE
  if (typeof rhoArcsec === 'number') named.alongArcsec = rhoArcsec
  if (typeof sigmas.raDeg === 'number') named.raCosDecArcsec = sigmas.raDeg * 3600 * Math.cos((values.decDeg ?? 0) * RADIANS_PER_DEGREE)
  if (typeof sigmas.decDeg === 'number') named.decArcsec = sigmas.decDeg * 3600
  if (diameterScaleArcmin !== null && typeof sigmas.r === 'number' && values.r) named.diameterArcmin = (diameterScaleArcmin * sigmas.r) / values.r ** 2
  return Object.fromEntries(Object.entries(named).filter((entry): entry is [string, number] => typeof entry[1] === 'number'))
}

/** The diameter, arcmin, shown at r = 1: r times diameter of any computed place; null where no diameters were measured. */
export function diameterScaleOf(result: FitResult): number | null {
  const { r, diameterArcmin } = result.residuals.find(({ computed }) => computed.diameterArcmin !== undefined)?.computed ?? {}
  return r === undefined || diameterArcmin === undefined ? null : r * diameterArcmin
}

/**
 * The years that the sky drawing marks: the coming one, then round ones a fifteenth of a period apart.
 * @param result a finished fit of kind `relative`.
 * @param nowYr Julian year now.
 * @returns Julian years, ascending.
 */
export function yearsToMark(result: FitResult, nowYr: number): number[] {
  const periodYr = result.elements.period?.value ?? 75
  const step = roundStep(Math.min(periodYr, 1500) * MARK_STEP_TURNS)
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9))
  const soonest = step >= 1 ? Math.ceil(nowYr) : (Math.floor(nowYr / step) + 1) * step
  const firstRound = (Math.floor(soonest / step) + 1) * step
  return [soonest, ...Array.from({ length: MARKED_YEARS - 1 }, (_, index) => firstRound + index * step)].map(year => Number(year.toFixed(decimals)))
}
