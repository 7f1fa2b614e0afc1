/** Errors estimated from the residuals, where no measure states one. */
import { effectiveRows, rescaleSkyMeasures, type SkyMeasures } from '../models/sky-measure'
import type { SettledPath } from '../search/settle-path'

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
