/** Errors estimated from the residuals, where no measure states one. */
import { effectiveRows, rescaleSkyMeasures, type SkyMeasures } from '../models/sky-measure'
import type { PlanePoints } from '../models/plane-measure'
import type { SettledPath } from '../search/settle-path'
import type { FitStatistics } from '../types'

/** Residuals below this part of the provisional errors are rounding and estimate nothing. */
const NOISE_FREE = 1e-9

/**
 * Gives equal errors the size that the residuals show.
 * @param measures that a first fit used.
 * @param settled that fit.
 * @returns measures with reduced χ² = 1; the same measures where errors were stated, nothing is left over to estimate from, or the
 * residuals are rounding.
 */
export function withEstimatedErrors(measures: SkyMeasures, { solution }: SettledPath): SkyMeasures {
  const degrees = effectiveRows(measures.used) - solution.values.length
  const factor = degrees > 0 ? Math.sqrt(solution.chiSquare / degrees) : 0
  return measures.basis === 'scaled' && factor > NOISE_FREE ? rescaleSkyMeasures(measures, factor) : measures
}

/**
 * The estimated error of measures on the sky, for the statistics.
 * @param measures with their last errors.
 * @returns one σ for all, that of a single night, arcsec; nothing where errors were stated.
 */
export function estimatedSigma(measures: SkyMeasures): Pick<FitStatistics, 'estimatedSigma'> {
  if (measures.basis !== 'scaled') return {}
  const { sigmaAlong, nightsFactor } = measures.all.find((measure) => measure.status === 'used')!
  return { estimatedSigma: { position: { value: sigmaAlong / nightsFactor, unit: 'arcsec' } } }
}

/**
 * The estimated error of measures in the plane, for the statistics.
 * @param points with their last errors.
 * @returns one σ for each coordinate measured; nothing where errors were stated.
 */
export function estimatedPlaneSigma(points: PlanePoints): Pick<FitStatistics, 'estimatedSigma'> {
  if (points.basis !== 'scaled') return {}
  const estimated: NonNullable<FitStatistics['estimatedSigma']> = {}
  for (const point of points.used) estimated[point.coordinate] = { value: point.sigma, unit: point.coordinate === 'r' ? points.unit : 'arcmin' }
  return { estimatedSigma: estimated }
}
