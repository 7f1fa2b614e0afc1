/** From the solution of a conic in its plane to its result. */
import { atan2, cos, hypot, RAD, sin } from '../elementary'
import { withinTurn } from '../conic/thiele-innes'
import { PLANE_NAMES } from '../models/plane'
import type { PlanePoint, PlanePoints } from '../models/plane-measure'
import { wrapToHalfTurn } from '../models/relative-kepler'
import { covarianceOf } from '../solve/covariance'
import type { Solution } from '../solve/levenberg-marquardt'
import type { FitResult, FitSettings, FitStatistics, Residual } from '../types'
import { elementOf, errorScale, quadraticForm, type Quantity } from '../uncertainty/error-scale'
import { influenceOf } from '../uncertainty/influence'
import { rmsByCoordinate, statisticsByObserver } from '../uncertainty/observer-statistics'
import { planeConic } from '../uncertainty/plane-conic'
import { planeWarnings } from '../uncertainty/plane-warnings'
import { ENGINE_VERSION } from '../version'
import { estimatedPlaneSigma } from './estimated-errors'
import { publishedCovariance } from './judge-relative'
import { stopSentence } from './stop-sentence'

export interface PlaneJudgement {
  points: PlanePoints
  solution: Solution
  settings: FitSettings
  parabolaChiSquare: number | null
}

/** p, e and φ₀ with gradients by (p, k, h). */
export function planeQuantities(values: ArrayLike<number>, unit: string): Record<'semiLatusRectum' | 'eccentricity' | 'periapsisDirection', Quantity> {
  const k = values[1]!
  const h = values[2]!
  const e = hypot(k, h)
  const direction = withinTurn(atan2(h, k)) * RAD
  return {
    semiLatusRectum: { value: values[0]!, gradient: [1, 0, 0], unit },
    eccentricity: { value: e, gradient: e > 0 ? [0, k / e, h / e] : [0, 1, 0], unit: '' },
    periapsisDirection: { value: direction, gradient: e > 0 ? [0, (-h / (e * e)) * RAD, (k / (e * e)) * RAD] : [0, Infinity, 0], unit: 'deg' },
  }
}

interface PointContext {
  values: ArrayLike<number>
  covariance: number[][] | null
  scaleSquared: number | null
  diameterScale: number | null
}

function residualOf(point: PlanePoint, { values, covariance, scaleSquared, diameterScale }: PointContext): Residual {
  const p = values[0]!
  const c = cos(point.phiRad)
  const s = sin(point.phiRad)
  const denominator = 1 + values[1]! * c + values[2]! * s
  const r = denominator > 0 ? p / denominator : NaN
  const isDiameter = point.coordinate === 'diameterArcmin'
  const scale = diameterScale ?? 1
  const model = isDiameter ? scale / r : r
  const whitening = Math.sqrt(point.weight) / point.sigma
  const row = (model - point.value) * whitening
  const byShape = (isDiameter ? scale / p : -r / denominator) * whitening
  const gradient = [(isDiameter ? -model / p : r / p) * whitening, byShape * c, byShape * s]
  const isReached = denominator > 0
  const influence = point.status === 'used' && covariance !== null ? influenceOf({ residuals: [row], gradients: [gradient] }, covariance, scaleSquared) : null
  const difference = isReached ? point.value - model : null
  return {
    id: point.id,
    status: point.status,
    computed: isReached ? (isDiameter ? { r, diameterArcmin: model } : { r }) : {},
    observedMinusComputed: { r: isReached ? point.r - r : null, ...(isDiameter ? { diameterArcmin: difference } : {}) },
    normalised: isReached ? Math.abs(row) : null,
    rows: isReached ? [row] : [],
    weight: point.status === 'used' ? point.weight : 0,
    leverage: influence?.leverage ?? null,
    cook: influence?.cook ?? null,
    inOrbitPlane: { trueAnomalyDeg: wrapToHalfTurn(point.phiRad - atan2(values[2]!, values[1]!)) * RAD, radius: point.r },
  }
}

/** 360° less the largest gap between neighbouring directions. */
function coveredDeg(points: readonly PlanePoint[]): number {
  const directions = points.map((point) => withinTurn(point.phiRad) * RAD).sort((a, b) => a - b)
  let gap = directions[0]! + 360 - directions[directions.length - 1]!
  for (let i = 1; i < directions.length; i++) gap = Math.max(gap, directions[i]! - directions[i - 1]!)
  return 360 - gap
}

function arcOf(points: readonly PlanePoint[]): FitStatistics['arc'] {
  const epochs = points.map((point) => point.epochYr).filter((epoch): epoch is number => epoch !== null)
  return {
    firstEpochYr: epochs.length > 0 ? epochs[0]! : null,
    lastEpochYr: epochs.length > 0 ? epochs[epochs.length - 1]! : null,
    turns: null,
    trueAnomalyCoveredDeg: coveredDeg(points),
    positionAngleCoveredDeg: null,
  }
}

/**
 * Judges a plane fit.
 * @param judgement points with their errors, solution, χ² of the held parabola.
 * @returns the result that leaves the door.
 */
export function judgePlane(judgement: PlaneJudgement): FitResult {
  const { points, solution, settings, parabolaChiSquare } = judgement
  const { values, chiSquare, residuals: rows, jacobian } = solution
  const degreesOfFreedom = rows.length - values.length
  const { matrix, conditionNumber, rank } = covarianceOf({ rows: rows.length, columns: values.length, jacobian, residuals: rows })
  const scale = errorScale(points.basis, chiSquare, degreesOfFreedom)
  const reducedChiSquare = degreesOfFreedom > 0 ? chiSquare / degreesOfFreedom : null
  const context: PointContext = { values, covariance: matrix, scaleSquared: reducedChiSquare, diameterScale: points.diameterScale }
  const residuals = points.all.map((point) => residualOf(point, context))
  const units = { r: points.unit, diameterArcmin: 'arcmin' }
  const statistics: FitStatistics = {
    measures: points.all.length, used: points.used.length, rows: rows.length, parameters: values.length, degreesOfFreedom, chiSquare, reducedChiSquare,
    rms: rmsByCoordinate(residuals, units),
    conditionNumber: conditionNumber < Infinity ? conditionNumber : null,
    errorBasis: points.basis,
    rank,
    ...estimatedPlaneSigma(points),
    arc: arcOf(points.used),
    byObserver: statisticsByObserver(residuals, points.all.map((point) => point.observer), Object.keys(units)),
  }
  const quantities = planeQuantities(values, points.unit)
  const names = Object.keys(quantities) as (keyof typeof quantities)[]
  const elements = Object.fromEntries(names.map((name) => [name, elementOf(quantities[name], matrix, scale)]))
  const published = publishedCovariance(matrix, scale.published)
  const elementMatrix = published?.map((_, i) => names.map((name) => quadraticForm(published, quantities[names[i]!].gradient, quantities[name].gradient))) ?? null
  const conic = planeConic({ semiLatusRectum: elements.semiLatusRectum!, eccentricity: elements.eccentricity!, chiSquare, parabolaChiSquare, scaleSquared: points.basis === 'formal' ? 1 : Math.max(1, reducedChiSquare ?? 1) })
  return {
    format: 1,
    kind: 'plane',
    model: 'kepler',
    engine: { version: ENGINE_VERSION, seed: settings.seed ?? 1 },
    stop: { reason: degreesOfFreedom === 0 ? 'exact' : solution.reason, sentence: stopSentence(degreesOfFreedom === 0 ? 'exact' : solution.reason), iterations: solution.iterations },
    conic,
    elements,
    covariance: elementMatrix !== null && elementMatrix.every((row) => row.every((value) => value - value === 0)) ? { names: [...names], matrix: elementMatrix } : null,
    constants: null,
    statistics,
    residuals,
    alternatives: [],
    proposals: [],
    warnings: planeWarnings({ points, statistics, residuals, conic }),
    state: { model: 'plane', names: [...PLANE_NAMES], values: Array.from(values), covariance: published, referenceEpochYr: 0 },
  }
}
