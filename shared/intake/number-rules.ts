import type { NumberRule } from './row-reader'
import { SKY_SENTENCES, VALUE_SENTENCES } from './sentences'

/** The limits of single values; what depends on two cells of a row stands with the row. */

export const FULL_TURN_DEG = 360

/** θ and φ: 0 to 360, where 360 itself is read as 0 by the caller. */
export const direction: NumberRule = value =>
  value >= 0 && value <= FULL_TURN_DEG ? null : VALUE_SENTENCES.angleRange(wrapped(value))

function wrapped(valueDeg: number): string {
  const turns = valueDeg - FULL_TURN_DEG * Math.floor(valueDeg / FULL_TURN_DEG)
  return String(Number(turns.toPrecision(12)))
}

export const declination: NumberRule = value => (value >= -90 && value <= 90 ? null : SKY_SENTENCES.decRange())

export const separation: NumberRule = (value) => {
  if (value === 0) return VALUE_SENTENCES.separationZero()
  return value < 0 ? VALUE_SENTENCES.separationNegative() : null
}

export const positive: NumberRule = value => (value > 0 ? null : VALUE_SENTENCES.notPositive())
export const standardError: NumberRule = value => (value > 0 ? null : VALUE_SENTENCES.sigmaNotPositive())
export const correlation: NumberRule = value => (Math.abs(value) < 1 ? null : VALUE_SENTENCES.correlationRange())
export const nights: NumberRule = value => (value >= 1 ? null : VALUE_SENTENCES.nightsBelowOne())

export function within(low: number, high: number, unit: string): NumberRule {
  return value => (value >= low && value <= high ? null : VALUE_SENTENCES.outOfRange(low, high, unit))
}
