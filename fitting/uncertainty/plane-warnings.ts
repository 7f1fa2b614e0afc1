/** Cautions in words that belong to a plane fit. */
import type { PlanePoints } from '../models/plane-measure'
import type { Conic, FitStatistics, Residual } from '../types'

const SHORT_ARC_DEG = 120
const LARGE_SCATTER = 2
const OUTLIER_SIGMA = 5

export interface PlaneFindings {
  points: PlanePoints
  statistics: FitStatistics
  residuals: Residual[]
  conic: Conic
}

/**
 * Warnings of a plane fit.
 * @param findings everything that the fit found.
 * @returns sentences.
 */
export function planeWarnings({ points, statistics, residuals, conic }: PlaneFindings): string[] {
  const warnings: string[] = []
  const { errorBasis, reducedChiSquare, degreesOfFreedom, arc, conditionNumber } = statistics
  if (points.isRelative) warnings.push('No scale was stated for the apparent diameters: distances are relative to that at the median diameter, and only the shape is known.')
  if (points.all.some((point) => point.epochYr !== null)) warnings.push('Times were given; this fit uses directions and distances only.')
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
