import type { Prediction } from '../../fitting/types'

/** Places nearer to the Sun than this carry its warning. */
export const NEAR_SUN_DEG = 20

/** Whether any of these places stands within 20° of the Sun. */
export function comesNearSun(predictions: readonly Prediction[]): boolean {
  return predictions.some(({ values: { elongationDeg } }) => elongationDeg !== undefined && elongationDeg < NEAR_SUN_DEG)
}
