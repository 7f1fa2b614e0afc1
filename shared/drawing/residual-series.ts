import type { FitResult, Residual } from '../../fitting/types'

/** What one residual plot needs of a measure that does not come with the result. */
export interface ResidualSubject {
  id: string
  observer: string
  epochYr: number | null
  phiDeg: number | null
}

export interface ResidualPoint {
  id: string
  observer: string
  /** Julian year, or φ in degrees. */
  at: number
  /** Observed minus computed in the series' unit. */
  value: number
  status: Residual['status']
}

/** Half-width of the prediction's σ at a place of the axis. */
export interface BandPoint {
  at: number
  sigma: number
}

export interface ResidualSeries {
  /** Key of observedMinusComputed. */
  key: string
  name: string
  /** How the name is told in symbols: "ρ Δθ". */
  symbols: string
  unit: string
  points: ResidualPoint[]
  band: BandPoint[]
}

export interface ResidualChart {
  /** date: time as well, told by days and not by years. */
  axis: 'time' | 'date' | 'direction'
  axisName: string
  series: ResidualSeries[]
}

const COORDINATES: Record<string, { name: string; symbols: string }> = {
  acrossArcsec: { name: 'across', symbols: 'ρ Δθ' },
  alongArcsec: { name: 'along', symbols: 'Δρ' },
  raCosDecArcsec: { name: 'right ascension', symbols: 'Δα cos δ' },
  decArcsec: { name: 'declination', symbols: 'Δδ' },
  r: { name: 'radius', symbols: 'Δr' },
  diameterArcmin: { name: 'diameter', symbols: 'Δd' },
}
/** A diameter gives r as well: it is shown as what was measured where every measure is one, else all are compared in r. */
function keysOf({ kind, residuals }: FitResult): string[] {
  if (kind === 'relative') return ['acrossArcsec', 'alongArcsec']
  if (kind === 'equatorial') return ['raCosDecArcsec', 'decArcsec']
  const isDiameter = ({ observedMinusComputed }: Residual) => typeof observedMinusComputed.diameterArcmin === 'number'
  return kind === 'plane' ? [residuals.every(isDiameter) ? 'diameterArcmin' : 'r'] : []
}

/** σ of a prediction by the keys of observedMinusComputed, in arcsec, arcmin or the unit of r. */
export type PredictedSigma = { at: number; sigmas: Record<string, number> }

/**
 * The residuals as plots show them: one series a coordinate over a shared axis, arcseconds as milliarcseconds where all of them are small.
 * @param result a finished fit.
 * @param subjects the fitted measures, for their observers and places on the axis.
 * @param predicted σ of the prediction along the axis; may be empty.
 * @returns the series that have a point; the axis is time, or φ where measures of a `plane` target carry no times.
 */
export function residualChart(result: FitResult, subjects: readonly ResidualSubject[], predicted: readonly PredictedSigma[]): ResidualChart {
  const byId = new Map(subjects.map(subject => [subject.id, subject]))
  const isTimed = result.kind !== 'plane'
  const pointsByKey = keysOf(result).map(key => ({ key, points: result.residuals.flatMap(residual => pointOf(residual, key, byId.get(residual.id), isTimed)) }))
  const all = pointsByKey.flatMap(({ points }) => points)
  const series = pointsByKey.filter(({ points }) => points.length > 0).map(({ key, points }) => {
    const { factor, unit } = scaleOf(key, all, result)
    const band = predicted.flatMap(({ at, sigmas }) => sigmas[key] === undefined ? [] : [{ at, sigma: sigmas[key] * factor }])
    return { key, ...(COORDINATES[key] ?? { name: key, symbols: key }), unit, band, points: points.map(point => ({ ...point, value: point.value * factor })) }
  })
  if (result.kind === 'equatorial') return { axis: 'date', axisName: 'date', series }
  return { axis: isTimed ? 'time' : 'direction', axisName: isTimed ? 'year' : 'φ, °', series }
}

function pointOf(residual: Residual, key: string, subject: ResidualSubject | undefined, isTimed: boolean): ResidualPoint[] {
  const value = residual.observedMinusComputed[key]
  const at = isTimed ? subject?.epochYr : subject?.phiDeg
  if (!subject || value === null || value === undefined || at === null || at === undefined) return []
  return [{ id: residual.id, observer: subject.observer, at, value, status: residual.status }]
}

/** Both arcsecond coordinates of a pair share a unit, so that their plots compare: `all` are the points of all series. */
function scaleOf(key: string, all: readonly ResidualPoint[], result: FitResult): { factor: number; unit: string } {
  if (key.endsWith('Arcmin')) return { factor: 60, unit: '″' }
  if (!key.endsWith('Arcsec')) return { factor: 1, unit: result.conic?.semiLatusRectum.unit ?? 'unit' }
  if (result.kind === 'equatorial') return { factor: 1, unit: '″' }
  const isSmall = all.every(point => Math.abs(point.value) < 1 || point.status !== 'used')
  return isSmall ? { factor: 1000, unit: 'mas' } : { factor: 1, unit: '″' }
}

/**
 * The half-height of a residual plot: the used measures decide, so that one set aside does not press the others flat.
 * @param series with at least one point.
 * @returns a length in the series' unit, > 0.
 */
export function halfHeight(series: ResidualSeries): number {
  const used = series.points.filter(point => point.status === 'used')
  const heights = (used.length > 0 ? used : series.points).map(point => Math.abs(point.value))
  const greatest = heights.reduce((most, height) => Math.max(most, height), 0)
  return greatest > 0 ? greatest * 1.2 : 1
}
