/**
 * Measures in the plane of the orbit made ready for the fit: sorted, each as a distance or an apparent diameter with its error.
 * A diameter d stands for r = c/d. Without a stated scale c it is the median diameter, so that r is relative.
 * Errors as for the sky: stated (formal), all alike in relative terms of r (scaled), or the missing at the median relative error (mixed).
 */
import type { FitSettings, PlaneMeasure } from '../types'
import { median } from '../solve/median'
import { compareMeasures, type ErrorBasis } from './sky-measure'

/** One measure with its error. */
export interface PlanePoint {
  id: string
  observer: string
  epochYr: number | null
  phiRad: number
  /** Which coordinate was measured. */
  coordinate: 'r' | 'diameterArcmin'
  /** The measured value and its standard error, in its own unit. */
  value: number
  sigma: number
  /** r = scale / value for diameters, r = value otherwise. */
  r: number
  weight: number
  status: 'used' | 'set-aside'
}

/** All measures of a request, sorted. */
export interface PlanePoints {
  all: PlanePoint[]
  used: PlanePoint[]
  basis: ErrorBasis
  /** c, arcmin × unit of r; null where no diameter was given. */
  diameterScale: number | null
  /** True where c is the median diameter. */
  isRelative: boolean
  /** Without stated errors: one σ for all distances alike. */
  unit: string
}

const PROVISIONAL_RELATIVE_SIGMA = 0.01

function toPoint(measure: PlaneMeasure, scale: number | null): PlanePoint {
  const isDiameter = measure.diameterArcmin !== undefined
  const value = (isDiameter ? measure.diameterArcmin : measure.r)!
  return {
    id: measure.id, observer: measure.observer, epochYr: measure.epochYr ?? null, phiRad: measure.phiRad,
    coordinate: isDiameter ? 'diameterArcmin' : 'r',
    value, sigma: (isDiameter ? measure.sigmaDiameterArcmin : measure.sigmaR) ?? NaN,
    r: isDiameter ? scale! / value : value,
    weight: measure.weightFactor ?? 1,
    status: measure.setAside === true ? 'set-aside' : 'used',
  }
}

function basisOf(used: readonly PlanePoint[], settings: FitSettings): ErrorBasis {
  if (settings.weights === 'equal') return 'scaled'
  const stated = used.filter((point) => point.sigma > 0).length
  return stated === used.length ? 'formal' : stated === 0 ? 'scaled' : 'mixed'
}

/** One error for all of a coordinate: of r in its unit, of d in arcmin. */
function equalError(point: PlanePoint, used: readonly PlanePoint[]): number {
  return PROVISIONAL_RELATIVE_SIGMA * median(used.filter((other) => other.coordinate === point.coordinate).map((other) => other.value))
}

function withError(point: PlanePoint, basis: ErrorBasis, used: readonly PlanePoint[], sigmaScale: number): PlanePoint {
  if (basis === 'scaled') return { ...point, sigma: equalError(point, used.length > 0 ? used : [point]) }
  if (point.sigma > 0) return { ...point, sigma: point.sigma * sigmaScale }
  const relative = median(used.filter((other) => other.sigma > 0).map((other) => other.sigma / other.value))
  return { ...point, sigma: relative * point.value * sigmaScale }
}

/**
 * Sorts measures and resolves their errors.
 * @param measures validated.
 * @param settings weights, sigmaScale, diameterScaleArcmin, radiusUnit.
 * @returns all points and the used ones, both sorted.
 */
export function preparePlanePoints(measures: readonly PlaneMeasure[], settings: FitSettings): PlanePoints {
  const sorted = [...measures].sort(compareMeasures)
  const diameters = sorted.filter((measure) => measure.diameterArcmin !== undefined)
  const isRelative = diameters.length > 0 && settings.diameterScaleArcmin === undefined
  const medianDiameter = () => median(diameters.filter((measure) => measure.setAside !== true).map((measure) => measure.diameterArcmin!))
  const diameterScale = diameters.length === 0 ? null : (settings.diameterScaleArcmin ?? medianDiameter())
  const points = sorted.map((measure) => toPoint(measure, diameterScale))
  const used = points.filter((point) => point.status === 'used')
  const basis = basisOf(used, settings)
  const all = points.map((point) => withError(point, basis, used, settings.sigmaScale ?? 1))
  const unit = isRelative ? 'of the distance at the median diameter' : (settings.radiusUnit ?? 'unit')
  return { all, used: all.filter((point) => point.status === 'used'), basis, diameterScale, isRelative, unit }
}

/**
 * Multiplies every error by a factor.
 * @param points as prepared.
 * @param factor > 0.
 * @returns the same points with scaled errors.
 */
export function rescalePlanePoints(points: PlanePoints, factor: number): PlanePoints {
  const all = points.all.map((point) => ({ ...point, sigma: point.sigma * factor }))
  return { ...points, all, used: all.filter((point) => point.status === 'used') }
}
