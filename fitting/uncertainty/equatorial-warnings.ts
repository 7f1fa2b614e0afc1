/** Cautions in words that belong to an equatorial fit. */
import { observerWarnings } from '../earth'
import type { Sightings } from '../models/sighting'
import type { Alternative, Conic, Element, FitStatistics, HonestArc, Residual } from '../types'

const LARGE_SCATTER = 2
const OUTLIER_SIGMA = 5
const LOOSE_ECCENTRICITY = 0.1
/** Beyond this σ the time of perihelion says little, d. */
const LOOSE_PERIHELION_DAYS = 10
const SUNWARD_FROM_SIGMA = 3

export interface EquatorialFindings {
  sightings: Sightings
  statistics: FitStatistics
  residuals: Residual[]
  conic: Conic
  elements: Record<string, Element>
  honestArc: HonestArc
  alternatives: Alternative[]
  /** Orbits through three measures, all of them; 0 where there are more measures. */
  exactSolutions: number
}

function scatterWarnings({ statistics, residuals }: EquatorialFindings): string[] {
  const warnings: string[] = []
  const { errorBasis, reducedChiSquare } = statistics
  if (errorBasis === 'mixed') warnings.push('Some measures state no error; the median of the stated errors was taken for them.')
  if (errorBasis === 'scaled') warnings.push('No measure states an error: all weigh alike, and errors come from the scatter of the residuals.')
  if (errorBasis !== 'scaled' && reducedChiSquare !== null && reducedChiSquare > LARGE_SCATTER * LARGE_SCATTER) {
    warnings.push(`The scatter is ${Math.sqrt(reducedChiSquare).toFixed(1)} times what the stated errors say: look for mistyped values or errors stated too small.`)
  }
  const limit = OUTLIER_SIGMA * Math.sqrt(Math.max(1, reducedChiSquare ?? 1))
  const outliers = residuals.filter((residual) => residual.status === 'used' && (residual.normalised ?? 0) > limit)
  if (outliers.length > 0) warnings.push(`More than ${OUTLIER_SIGMA} σ off: ${outliers.slice(0, 5).map((residual) => residual.id).join(', ')}${outliers.length > 5 ? ', …' : ''}.`)
  return warnings
}

function elementWarnings({ statistics, conic, elements, alternatives, exactSolutions }: EquatorialFindings): string[] {
  const warnings: string[] = []
  if (exactSolutions > 0) {
    warnings.push(exactSolutions === 1
      ? 'Three measures for six unknowns: the orbit passes through every measure and nothing tests it.'
      : `Three measures for six unknowns: ${exactSolutions} orbits pass through every measure, and nothing tells which is the true one. They stand side by side; none of them is the orbit.`)
  } else if (alternatives.length > 0) warnings.push(`${alternatives.length === 1 ? 'Another orbit fits' : `${alternatives.length} other orbits fit`} nearly as well: see the alternatives.`)
  if (statistics.conditionNumber === null) warnings.push('The measures do not determine all elements: no errors can be given.')
  const looseness = conic.eccentricity.sigma
  if (looseness !== null && looseness > LOOSE_ECCENTRICITY) warnings.push(`The eccentricity is known to ± ${looseness.toFixed(2)} only: errors of a linearised fit are rough here, and the elements strongly correlated.`)
  const passage = elements.perihelionTime?.sigma ?? null
  if (passage !== null && passage > LOOSE_PERIHELION_DAYS && elements.meanAnomaly) warnings.push('The time of perihelion is poorly determined; the mean anomaly at the epoch, with the argument of perihelion, says more.')
  if (conic.parabolaExcluded === false && conic.class !== 'parabola') warnings.push('A parabola is not excluded: period and semi-major axis say little.')
  if (conic.circleExcluded === false) warnings.push('A circle is not excluded: the direction of perihelion is poorly known.')
  return warnings
}

/** The mean O−C towards the Sun where it stands out of its error: for a comet the light is then not centred on the nucleus. */
function sunwardWarning(residuals: readonly Residual[]): string[] {
  const values = residuals.filter((residual) => residual.status === 'used').map((residual) => residual.observedMinusComputed.sunwardArcsec).filter((value) => typeof value === 'number')
  if (values.length < 6) return []
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length
  const error = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) * (value - mean), 0) / (values.length - 1) / values.length)
  if (!(Math.abs(mean) > SUNWARD_FROM_SIGMA * error)) return []
  return [`On the mean the measures lie ${Math.abs(mean).toFixed(2)} ± ${error.toFixed(2)}″ ${mean > 0 ? 'towards' : 'away from'} the Sun: in a comet the light may not be centred on the nucleus.`]
}

/**
 * Warnings of an equatorial fit.
 * @param findings everything that the fit found.
 * @returns sentences.
 */
export function equatorialWarnings(findings: EquatorialFindings): string[] {
  const { sightings, honestArc, residuals } = findings
  const isShort = honestArc.standing === 'honest' || honestArc.standing === 'perturbed'
  return [
    ...elementWarnings(findings),
    ...(isShort ? [] : [honestArc.statement]),
    ...scatterWarnings(findings),
    ...sunwardWarning(residuals),
    ...observerWarnings(sightings.used.map((sighting) => sighting.jdUtc)),
  ]
}
