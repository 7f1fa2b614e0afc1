/** From the solution of a conic in its plane to its result. */
import { atan2, hypot, RAD } from '../elementary'
import { withinTurn } from '../conic/thiele-innes'
import type { PlaneHeld } from '../models/held-plane'
import { PLANE_NAMES } from '../models/plane'
import { PLANE_MOTION_NAMES } from '../models/plane-motion'
import type { PlanePoint, PlanePoints } from '../models/plane-measure'
import { covarianceOf } from '../solve/covariance'
import type { Solution } from '../solve/levenberg-marquardt'
import type { Alternative, Conic, FitResult, FitSettings, FitStatistics } from '../types'
import { elementOf, errorScale, quadraticForm, type Quantity } from '../uncertainty/error-scale'
import { aboutHeld, markHeld } from '../uncertainty/held-elements'
import { rmsByCoordinate, statisticsByObserver } from '../uncertainty/observer-statistics'
import { planeConic } from '../uncertainty/plane-conic'
import { arealLawOf, planeConstants, planeTimeQuantities, type PlaneMotionContext } from '../uncertainty/plane-motion-elements'
import { planeResidual, widened, type PointContext } from '../uncertainty/plane-residuals'
import { planeWarnings } from '../uncertainty/plane-warnings'
import { ENGINE_VERSION } from '../version'
import { estimatedPlaneSigma } from './estimated-errors'
import { planeCovariance } from './hold-plane'
import { publishedCovariance } from './judge-relative'
import { stopSentence } from './stop-sentence'

export interface PlaneJudgement {
  points: PlanePoints
  solution: Solution
  /** Other minima that fit almost as well. */
  others: Solution[]
  /** Elements held, by name; none for the free fit. */
  held: PlaneHeld
  settings: FitSettings
  /** Julian year; null without times. */
  referenceEpochYr: number | null
  parabolaChiSquare: number | null
}

/** p, e and φ₀, with times P and T, with gradients by (p, k, h) or (p, k, h, H, φᵣ). */
export function planeQuantities(values: ArrayLike<number>, unit: string, referenceEpochYr: number | null): Record<string, Quantity> {
  const k = values[1]!
  const h = values[2]!
  const e = hypot(k, h)
  const direction = withinTurn(atan2(h, k)) * RAD
  const wide = (gradient: readonly number[]) => widened(gradient, values.length)
  return {
    semiLatusRectum: { value: values[0]!, gradient: wide([1, 0, 0]), unit },
    eccentricity: { value: e, gradient: wide(e > 0 ? [0, k / e, h / e] : [0, 1, 0]), unit: '' },
    periapsisDirection: { value: direction, gradient: wide(e > 0 ? [0, (-h / (e * e)) * RAD, (k / (e * e)) * RAD] : [0, Infinity, 0]), unit: 'deg' },
    ...(referenceEpochYr === null ? {} : planeTimeQuantities(values, referenceEpochYr)),
  }
}

/** 360° less the largest gap between neighbouring directions. */
function coveredDeg(points: readonly PlanePoint[]): number {
  const directions = points.map((point) => withinTurn(point.phiRad) * RAD).sort((a, b) => a - b)
  let gap = directions[0]! + 360 - directions[directions.length - 1]!
  for (let i = 1; i < directions.length; i++) gap = Math.max(gap, directions[i]! - directions[i - 1]!)
  return 360 - gap
}

function arcOf(points: readonly PlanePoint[], periodYr: number | undefined): FitStatistics['arc'] {
  const epochs = points.map((point) => point.epochYr).filter((epoch): epoch is number => epoch !== null)
  return {
    firstEpochYr: epochs.length > 0 ? epochs[0]! : null,
    lastEpochYr: epochs.length > 0 ? epochs[epochs.length - 1]! : null,
    turns: periodYr === undefined || epochs.length === 0 ? null : (epochs[epochs.length - 1]! - epochs[0]!) / periodYr,
    trueAnomalyCoveredDeg: coveredDeg(points),
    positionAngleCoveredDeg: null,
  }
}

/** Other minima with their elements and errors. */
function alternativesOf({ points, solution, others, referenceEpochYr }: PlaneJudgement, scaleSquared: number): Alternative[] {
  return others.map((other) => {
    const { values, residuals, jacobian, chiSquare } = other
    const { matrix } = covarianceOf({ rows: residuals.length, columns: values.length, jacobian, residuals })
    const scale = errorScale(points.basis, chiSquare, residuals.length - values.length)
    const elements = Object.entries(planeQuantities(values, points.unit, referenceEpochYr)).map(([name, quantity]) => [name, elementOf(quantity, matrix, scale)] as const)
    return { deltaChiSquare: (chiSquare - solution.chiSquare) / scaleSquared, elements: Object.fromEntries(elements) }
  })
}

function covarianceOfElements(published: number[][] | null, quantities: Record<string, Quantity>): FitResult['covariance'] {
  if (published === null) return null
  const names = Object.keys(quantities)
  const matrix = names.map((a) => names.map((b) => quadraticForm(published, quantities[a]!.gradient, quantities[b]!.gradient)))
  return matrix.every((row) => row.every((value) => value - value === 0)) ? { names, matrix } : null
}

/** A held eccentricity says nothing about being bound. */
function withHeldShape(held: PlaneHeld, conic: Conic): Conic {
  if (held.eccentricity === undefined) return conic
  const [name] = conic.statement.split(':')
  return { ...conic, probabilityBound: null, parabolaExcluded: null, circleExcluded: null, statement: `${name}: its eccentricity is held at ${held.eccentricity}` }
}

/**
 * Judges a plane fit.
 * @param judgement points with their errors, solutions, reference epoch where there are times, χ² of the held parabola.
 * @returns the result that leaves the door.
 */
export function judgePlane(judgement: PlaneJudgement): FitResult {
  const { points, solution, held, settings, referenceEpochYr, parabolaChiSquare } = judgement
  const { values, chiSquare, residuals: rows } = solution
  const { matrix, conditionNumber, rank, free } = planeCovariance(solution, held)
  const degreesOfFreedom = rows.length - free
  const scale = errorScale(points.basis, chiSquare, degreesOfFreedom)
  const reducedChiSquare = degreesOfFreedom > 0 ? chiSquare / degreesOfFreedom : null
  const context: PointContext = { values, covariance: matrix, scaleSquared: reducedChiSquare, diameterScale: points.diameterScale, referenceEpochYr }
  const residuals = points.all.map((point) => planeResidual(point, context))
  const units = { r: points.unit, diameterArcmin: 'arcmin', across: points.unit }
  const quantities = planeQuantities(values, points.unit, referenceEpochYr)
  const motion: PlaneMotionContext | null = referenceEpochYr === null ? null
    : { points: points.used, values, referenceEpochYr, covariance: matrix, scale, unit: points.unit, diameterScale: points.diameterScale }
  const statistics: FitStatistics = {
    measures: points.all.length, used: points.used.length, rows: rows.length, parameters: free, degreesOfFreedom, chiSquare, reducedChiSquare,
    rms: rmsByCoordinate(residuals, units),
    conditionNumber: conditionNumber < Infinity ? conditionNumber : null,
    errorBasis: points.basis,
    rank,
    ...estimatedPlaneSigma(points),
    ...(motion === null ? {} : arealLawOf(motion)),
    arc: arcOf(points.used, quantities.period?.value),
    byObserver: statisticsByObserver(residuals, points.all.map((point) => point.observer), Object.keys(units)),
  }
  const elements = Object.fromEntries(Object.entries(quantities).map(([name, quantity]) => [name, elementOf(quantity, matrix, scale)]))
  markHeld(elements, held)
  const published = publishedCovariance(matrix, scale.published)
  const scaleSquared = points.basis === 'formal' ? 1 : Math.max(1, reducedChiSquare ?? 1)
  const conic = withHeldShape(held, planeConic({ semiLatusRectum: elements.semiLatusRectum!, eccentricity: elements.eccentricity!, chiSquare, parabolaChiSquare, scaleSquared }))
  const alternatives = alternativesOf(judgement, Math.max(1, reducedChiSquare ?? 1))
  return {
    format: 1,
    kind: 'plane',
    model: 'kepler',
    engine: { version: ENGINE_VERSION, seed: settings.seed ?? 1 },
    stop: { reason: degreesOfFreedom === 0 ? 'exact' : solution.reason, sentence: stopSentence(degreesOfFreedom === 0 ? 'exact' : solution.reason), iterations: solution.iterations },
    conic,
    elements,
    covariance: covarianceOfElements(published, quantities),
    constants: motion === null ? null : planeConstants(motion),
    statistics,
    residuals,
    alternatives,
    proposals: [],
    warnings: [...planeWarnings({ points, statistics, residuals, conic, alternatives, isRetrograde: referenceEpochYr === null ? null : values[3]! < 0 }), ...aboutHeld(held)],
    state: { model: 'plane', names: referenceEpochYr === null ? [...PLANE_NAMES] : [...PLANE_MOTION_NAMES], values: Array.from(values), covariance: published, referenceEpochYr: referenceEpochYr ?? 0 },
  }
}
