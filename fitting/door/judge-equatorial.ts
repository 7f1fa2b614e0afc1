/** From the solutions of an equatorial fit to its result: elements, errors, residuals, alternatives, honest arc, warnings. */
import { acos } from '../elementary'
import type { Forces } from '../models/equatorial-orbit'
import type { Sightings } from '../models/sighting'
import type { SettledSights } from '../search/settle-sights'
import { covarianceOf } from '../solve/covariance'
import type { Alternative, Element, FitResult, FitSettings, FitStatistics, Residual } from '../types'
import { absoluteMagnitude, type MeasuredBrightness } from '../uncertainty/brightness'
import { equatorialElements, PERIHELION_NAMES, type EquatorialElements } from '../uncertainty/equatorial-elements'
import { equatorialArc, equatorialConic, equatorialConstants, type MotionFindings } from '../uncertainty/equatorial-motion'
import { equatorialWarnings } from '../uncertainty/equatorial-warnings'
import { elementOf, errorScale, quadraticForm } from '../uncertainty/error-scale'
import { honestArc } from '../uncertainty/honest-arc'
import { rmsByCoordinate, statisticsByObserver } from '../uncertainty/observer-statistics'
import type { Errors } from '../uncertainty/relative-motion'
import { SIGHT_UNITS, sightResiduals } from '../uncertainty/sight-residuals'
import { ENGINE_VERSION } from '../version'
import { publishedCovariance } from './judge-relative'
import { stopSentence } from './stop-sentence'

export interface EquatorialJudgement {
  /** Best first, at least one. */
  settled: SettledSights[]
  sightings: Sightings
  settings: FitSettings
  forces: Forces
  /** From the first to the last used measure, d. */
  days: number
  nearestAu: number
  /** χ² with e = 1 held; null where there is no such orbit. Called only where a parabola is in question. */
  parabolaChiSquare: () => number | null
}

const ALTERNATIVE_WITHIN = 9
const ALTERNATIVES_AT_MOST = 8
/** With e this many σ from 1 a parabola is out of the question, and none is fitted. */
const PARABOLA_WITHIN_SIGMA = 8
/** χ² below this passes through every measure. */
const EXACT_BELOW = 1e-6

/** χ² of the held parabola where e is not far from 1. */
function parabolaOf({ parabolaChiSquare }: EquatorialJudgement, { settled, elements, errors }: Judged): number | null {
  if (settled.orbit.reference.motion) return null
  const { sigma } = elementOf(elements.quantities.eccentricity!, errors.covariance, errors.scale)
  const isFar = sigma !== null && Math.abs(1 - elements.at.eccentricity) > PARABOLA_WITHIN_SIGMA * sigma
  return isFar ? null : parabolaChiSquare()
}

interface Judged {
  settled: SettledSights
  elements: EquatorialElements
  errors: Errors & { conditionNumber: number; rank: number }
}

function judged(settled: SettledSights, sightings: Sightings): Judged {
  const { solution, orbit } = settled
  const { residuals, jacobian, values, chiSquare } = solution
  const { matrix, conditionNumber, rank } = covarianceOf({ rows: residuals.length, columns: values.length, jacobian, residuals })
  return {
    settled,
    elements: equatorialElements(orbit, values, orbit.reference.jdTt),
    errors: { covariance: matrix, conditionNumber, rank, scale: errorScale(sightings.basis, chiSquare, residuals.length - values.length) },
  }
}

function publishedElements({ elements, errors, settled }: Judged): Record<string, Element> {
  const published = Object.fromEntries(Object.entries(elements.quantities).map(([name, quantity]) => [name, elementOf(quantity, errors.covariance, errors.scale)]))
  if (settled.orbit.reference.motion) published.eccentricity = { value: 1, sigma: null, sigmaFormal: null, sigmaScaled: null, unit: '' }
  return published
}

/** Covariance of the published elements, with the errors to publish; a held e is left out. */
function elementCovariance({ elements, errors, settled }: Judged): FitResult['covariance'] {
  const matrix = publishedCovariance(errors.covariance, errors.scale.published)
  if (matrix === null) return null
  const names = PERIHELION_NAMES.filter((name) => name !== 'eccentricity' || !settled.orbit.reference.motion)
  const gradients = names.map((name) => elements.quantities[name]!.gradient)
  const rows = gradients.map((g) => gradients.map((h) => quadraticForm(matrix, g, h)))
  return rows.every((row) => row.every((value) => value - value === 0)) ? { names: [...names], matrix: rows } : null
}

/** Solutions that stand beside the best: all exact ones of three measures, else minima nearly as good. */
function standBeside({ settled, sightings }: EquatorialJudgement, scaleSquared: number): SettledSights[] {
  const best = settled[0]!.solution.chiSquare
  const isExact = sightings.used.length === 3
  return settled.slice(1).filter(({ solution: { chiSquare, reason } }) => (isExact
    ? chiSquare < EXACT_BELOW
    : reason !== 'iteration-limit' && reason !== 'singular' && chiSquare - best < ALTERNATIVE_WITHIN * scaleSquared)).slice(0, ALTERNATIVES_AT_MOST)
}

function statisticsOf(best: Judged, { sightings }: EquatorialJudgement, findings: MotionFindings): Omit<FitStatistics, 'rms' | 'byObserver'> {
  const { chiSquare, residuals, values } = best.settled.solution
  const degreesOfFreedom = residuals.length - values.length
  return {
    measures: sightings.all.length, used: sightings.used.length, rows: residuals.length, parameters: values.length, degreesOfFreedom, chiSquare,
    reducedChiSquare: degreesOfFreedom > 0 ? chiSquare / degreesOfFreedom : null,
    conditionNumber: best.errors.conditionNumber < Infinity ? best.errors.conditionNumber : null,
    errorBasis: sightings.basis,
    rank: best.errors.rank,
    ...(sightings.basis === 'scaled' ? { estimatedSigma: { position: { value: sightings.used[0]!.sigmaEastArcsec, unit: 'arcsec' } } } : {}),
    arc: equatorialArc(findings),
  }
}

/** Magnitudes of the used measures with the distances of the orbit. */
function brightnessOf({ all }: Sightings, residuals: readonly Residual[]): MeasuredBrightness[] {
  return all.flatMap(({ magnitude, band, status, observer }, i) => {
    const { distanceAu, sunDistanceAu } = residuals[i]!.computed
    if (magnitude === null || status !== 'used' || distanceAu === undefined || sunDistanceAu === undefined) return []
    const toSun = Math.sqrt(observer[0]! * observer[0]! + observer[1]! * observer[1]! + observer[2]! * observer[2]!)
    const cosine = (distanceAu * distanceAu + sunDistanceAu * sunDistanceAu - toSun * toSun) / (2 * distanceAu * sunDistanceAu)
    return [{ magnitude, band, distanceAu, sunDistanceAu, phaseRad: acos(Math.max(-1, Math.min(1, cosine))) }]
  })
}

/**
 * Judges an equatorial fit.
 * @param judgement solutions best first, measures with their errors, forces, arc.
 * @returns the result that leaves the door.
 */
export function judgeEquatorial(judgement: EquatorialJudgement): FitResult {
  const { settled, sightings, settings, forces, days, nearestAu } = judgement
  const best = judged(settled[0]!, sightings)
  const { orbit, solution } = best.settled
  const findings: MotionFindings = { orbit, values: solution.values, elements: best.elements, errors: best.errors, used: sightings.used }
  const partial = statisticsOf(best, judgement, findings)
  const residuals = sightResiduals(sightings.all, { orbit, values: solution.values, covariance: best.errors.covariance, scaleSquared: partial.reducedChiSquare })
  const statistics: FitStatistics = {
    ...partial,
    rms: rmsByCoordinate(residuals, SIGHT_UNITS),
    byObserver: statisticsByObserver(residuals, sightings.all.map((sighting) => sighting.credit), Object.keys(SIGHT_UNITS)),
  }
  const scaleSquared = Math.max(1, partial.reducedChiSquare ?? 1)
  const conic = equatorialConic(findings, { chiSquare: solution.chiSquare, parabolaChiSquare: parabolaOf(judgement, best), scaleSquared: sightings.basis === 'formal' ? 1 : scaleSquared })
  const elements = publishedElements(best)
  const brightness = absoluteMagnitude(brightnessOf(sightings, residuals), best.elements.at.eccentricity)
  if (brightness !== null) elements[brightness.name] = brightness.element
  const beside = standBeside(judgement, scaleSquared)
  const alternatives = beside.map((other): Alternative => ({
    deltaChiSquare: Math.max(0, (other.solution.chiSquare - solution.chiSquare) / scaleSquared), elements: publishedElements(judged(other, sightings)),
  }))
  const honest = honestArc({ days, perihelionDistanceAu: best.elements.at.perihelionDistanceAu, eccentricity: best.elements.at.eccentricity, nearestAu, forces })
  const isExact = sightings.used.length === 3 && solution.chiSquare < EXACT_BELOW
  const reason = partial.degreesOfFreedom === 0 && isExact ? 'exact' : solution.reason
  return {
    format: 1,
    kind: 'equatorial',
    model: 'kepler',
    engine: { version: ENGINE_VERSION, seed: settings.seed ?? 1 },
    stop: { reason, sentence: stopSentence(reason), iterations: solution.iterations },
    conic,
    elements,
    nodeStatus: 'ascending',
    nodeEquinox: 2000,
    epochOfElements: orbit.reference.jdTt,
    frame: 'ecliptic and equinox of J2000',
    honestArc: honest,
    covariance: elementCovariance(best),
    constants: equatorialConstants(findings),
    statistics,
    residuals,
    alternatives,
    proposals: [],
    warnings: equatorialWarnings({ sightings, statistics, residuals, conic, elements, honestArc: honest, alternatives, exactSolutions: isExact ? 1 + alternatives.length : 0 }),
    state: {
      model: orbit.reference.motion ? 'parabola' : 'sight', names: [...orbit.map.names], values: Array.from(solution.values),
      covariance: publishedCovariance(best.errors.covariance, best.errors.scale.published), referenceEpochYr: 0, reference: orbit.reference, forces,
    },
  }
}
