import type { Kind, Prediction } from '../../fitting/types'

const YEARS_AHEAD = 10
const DIRECTION_STEP_DEG = 10

/**
 * Where an edition predicts: the beginnings of ten Julian years from the year of publication for a pair, every 10° of φ in the
 * plane of the orbit.
 */
export function predictionPlaces(kind: Kind, publishedAt: string): number[] {
  if (kind === 'plane') return Array.from({ length: 360 / DIRECTION_STEP_DEG }, (_, k) => k * DIRECTION_STEP_DEG)
  const firstYear = Number(publishedAt.slice(0, 4))
  return Array.from({ length: YEARS_AHEAD }, (_, k) => firstYear + k)
}

/** An open conic has no distance beyond its asymptotes: for such directions the engine answers no values. */
export function isOnTheCurve(prediction: Prediction): boolean {
  const values = Object.values(prediction.values)
  return values.length > 0 && values.every(Number.isFinite)
}
