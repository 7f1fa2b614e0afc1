/** Cautions in words that belong to a plane fit. */
import type { PlanePoints } from '../models/plane-measure'
import type { Alternative, Conic, FitStatistics, Residual } from '../types'

const SHORT_ARC_DEG = 120
const LARGE_SCATTER = 2
const OUTLIER_SIGMA = 5
/** A change of the areal velocity beyond this many σ is spoken of. */
const AREAS_DIFFER_SIGMA = 3
/** Periods of which less than this part was seen are poorly known. */
const SHORT_TURNS = 0.5

export interface PlaneFindings {
  points: PlanePoints
  statistics: FitStatistics
  residuals: Residual[]
  conic: Conic
  alternatives: Alternative[]
  /** Whether φ falls with time; null without times. */
  isRetrograde: boolean | null
}

function aboutMotion({ points, statistics, alternatives, isRetrograde }: PlaneFindings): string[] {
  const timed = points.used.filter((point) => point.epochYr !== null).length
  if (isRetrograde === null) return timed === 0 ? [] : ['Times of fewer than three epochs were given: this fit uses directions and distances only.']
  const warnings = ['Directions state no error of their own: each place was weighed across its direction with the error of its distance.']
  const { arealLaw, arc } = statistics
  if (alternatives.length > 0) warnings.push(`${alternatives.length === 1 ? 'Another motion fits' : `${alternatives.length} other motions fit`} almost as well (Δχ² below 9), as happens with measures at equal intervals; the longest period is given.`)
  if (timed < points.used.length) warnings.push(`${points.used.length - timed} of ${points.used.length} measures have no time: they bear on the shape only.`)
  if (isRetrograde) warnings.push('The motion is retrograde: φ falls with time.')
  if (arc.turns !== null && arc.turns < SHORT_TURNS) warnings.push(`The measures cover ${(100 * arc.turns).toFixed(0)} % of one period: elements of so short an arc change much with every new measure.`)
  if (arealLaw !== undefined && Math.abs(arealLaw.changePerYr) > AREAS_DIFFER_SIGMA * arealLaw.sigma) {
    warnings.push(`The areal velocity ½ r² φ̇ changes with time by ${(Math.abs(arealLaw.changePerYr) / arealLaw.sigma).toFixed(1)} times its error: look for wrong times, or for forces other than that of the focus.`)
  }
  return warnings
}

/**
 * Warnings of a plane fit.
 * @param findings everything that the fit found.
 * @returns sentences.
 */
export function planeWarnings(findings: PlaneFindings): string[] {
  const { points, statistics, residuals, conic } = findings
  const warnings: string[] = aboutMotion(findings)
  const { errorBasis, reducedChiSquare, degreesOfFreedom, arc, conditionNumber } = statistics
  if (points.isRelative) warnings.push('No scale was stated for the apparent diameters: distances are relative to that at the median diameter, and only the shape is known.')
  if (degreesOfFreedom === 0) warnings.push('There are three measures for three unknowns: the conic passes through every measure and nothing tests it.')
  if (conditionNumber === null) warnings.push('The measures do not determine all elements: no errors can be given.')
  if ((arc.trueAnomalyCoveredDeg ?? 360) < SHORT_ARC_DEG) warnings.push(`The measures cover ${arc.trueAnomalyCoveredDeg!.toFixed(0)}° of direction: shape and direction of the periapsis depend strongly on each measure.`)
  if (errorBasis === 'mixed') warnings.push('Some measures state no error; the median of the stated relative errors was taken for them.')
  if (errorBasis === 'scaled') warnings.push('No measure states an error: all weigh alike, and errors come from the scatter of the residuals.')
  if (errorBasis !== 'scaled' && reducedChiSquare !== null && reducedChiSquare > LARGE_SCATTER) {
    warnings.push(`The scatter is ${Math.sqrt(reducedChiSquare).toFixed(1)} times what the stated errors say: look for mistyped values or errors stated too small.`)
  }
  if (conic.circleExcluded === false) warnings.push('A circle is not excluded: the direction of the periapsis is poorly known.')
  const outliers = residuals.filter((residual) => residual.status === 'used' && (residual.normalised ?? 0) > OUTLIER_SIGMA * Math.sqrt(Math.max(1, reducedChiSquare ?? 1)))
  if (outliers.length > 0) warnings.push(`More than ${OUTLIER_SIGMA} σ off: ${outliers.slice(0, 5).map((residual) => residual.id).join(', ')}${outliers.length > 5 ? ', …' : ''}.`)
  return warnings
}
