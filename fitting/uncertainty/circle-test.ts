import { exp } from '../elementary'

/** A circle is excluded where a true circle would give so large an e with at most this probability. */
const CIRCLE_EXCLUDED_BELOW = 0.05

/**
 * Is a circle excluded? exp(−e²/2σ²) is the probability that a true circle is fitted with so large an e.
 * @param eccentricity e, ≥ 0.
 * @param sigma its standard error; null where unknown.
 * @returns null where the error is unknown or 0.
 * Source: Lucy & Sweeney 1971, AJ 76, 544 (from memory).
 */
export function isCircleExcluded(eccentricity: number, sigma: number | null): boolean | null {
  if (sigma === null || !(sigma > 0)) return null
  return exp((-eccentricity * eccentricity) / (2 * sigma * sigma)) <= CIRCLE_EXCLUDED_BELOW
}
