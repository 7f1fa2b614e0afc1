import type { Kind, Prediction } from '../../fitting/types'

const YEARS_AHEAD = 10
const DIRECTION_STEP_DEG = 10

/** A moving body: every second day for the next weeks' observing, then about monthly to the end of a year. */
const NIGHTLY_STEP_DAYS = 2
const NIGHTLY_DAYS = 40
const MONTHLY_STEP_DAYS = 30
const YEAR_DAYS = 370
const UNIX_EPOCH_JD = 2_440_587.5
const DAY_MS = 86_400_000

/**
 * Where an edition predicts: the beginnings of ten Julian years from the year of publication for a pair; 0 h TT of every second day
 * over forty days and of every thirtieth over a year, from the day after publication, for a comet or minor planet (Julian dates);
 * every 10° of φ in the plane of the orbit.
 */
export function predictionPlaces(kind: Kind, publishedAt: string): number[] {
  if (kind === 'plane') return Array.from({ length: 360 / DIRECTION_STEP_DEG }, (_, k) => k * DIRECTION_STEP_DEG)
  if (kind === 'equatorial') return datesAhead(publishedAt)
  const firstYear = Number(publishedAt.slice(0, 4))
  return Array.from({ length: YEARS_AHEAD }, (_, k) => firstYear + k)
}

function datesAhead(publishedAt: string): number[] {
  const firstJd = Math.ceil(Date.parse(publishedAt) / DAY_MS) + UNIX_EPOCH_JD
  const nightly = Array.from({ length: NIGHTLY_DAYS / NIGHTLY_STEP_DAYS + 1 }, (_, k) => k * NIGHTLY_STEP_DAYS)
  const monthly = Array.from({ length: Math.floor((YEAR_DAYS - NIGHTLY_DAYS) / MONTHLY_STEP_DAYS) }, (_, k) => NIGHTLY_DAYS + (k + 1) * MONTHLY_STEP_DAYS)
  return [...nightly, ...monthly].map(days => firstJd + days)
}

/** An open conic has no distance beyond its asymptotes: for such directions the engine answers no values. */
export function isOnTheCurve(prediction: Prediction): boolean {
  const values = Object.values(prediction.values)
  return values.length > 0 && values.every(Number.isFinite)
}
