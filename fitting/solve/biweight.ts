/**
 * Tukey's biweight and Huber's weight for measures of one or two whitened rows.
 *   d = √Σr², s = median(d)/1.1774 for pairs, median|r|/0.6745 for single rows (1 for normal errors of the stated size),
 *   w = (1 − (d/cs)²)² inside c s, c = 6, and never below 1e-8, so that nothing is dropped.
 *   Huber: w = c s/d beyond c s, c = 1.345 for single rows and 1.856 for pairs (each leaves 17.9 % of normal measures outside).
 * Source: Beaton & Tukey 1974, Technometrics 16, 147; Huber 1964, Annals of Mathematical Statistics 35, 73; medians of the Rayleigh and half-normal distributions: common practice.
 */
import { median } from './median'

/** c: a measure further off than this many s carries no weight to speak of. */
export const BIWEIGHT_REACH = 6
export const SMALLEST_WEIGHT = 1e-8
const RAYLEIGH_MEDIAN = 1.1774100225154747
const HALF_NORMAL_MEDIAN = 0.6744897501960817
/** The part of the measures whose d² is summed to compare solutions. */
const TRIMMED_PART = 0.75

/** Scales of pairs and of single rows; 0 where the fit is exact. */
export interface RobustScale {
  pair: number
  single: number
}

/**
 * Scales from whitened lengths.
 * @param distances d of each measure, in stated σ.
 * @param isPair whether the measure has two rows.
 * @returns the scales; where one sort is missing it takes the other's.
 */
export function robustScale(distances: ArrayLike<number>, isPair: (index: number) => boolean): RobustScale {
  const pairs: number[] = []
  const singles: number[] = []
  for (let i = 0; i < distances.length; i++) (isPair(i) ? pairs : singles).push(distances[i]!)
  const pair = median(pairs) / RAYLEIGH_MEDIAN
  const single = median(singles) / HALF_NORMAL_MEDIAN
  return { pair: pair === pair ? pair : single, single: single === single ? single : pair }
}

/**
 * Weight of a measure.
 * @param distance d, ≥ 0.
 * @param scale s of its sort; 0 where the fit is exact.
 * @returns between 1e-8 and 1.
 * Source: Beaton & Tukey 1974, Technometrics 16, 147.
 */
export function biweight(distance: number, scale: number): number {
  if (!(scale > 0)) return distance > 0 ? SMALLEST_WEIGHT : 1
  const part = distance / (BIWEIGHT_REACH * scale)
  const rest = 1 - part * part
  return part < 1 ? Math.max(SMALLEST_WEIGHT, rest * rest) : SMALLEST_WEIGHT
}

const HUBER_SINGLE = 1.345
const HUBER_PAIR = 1.8559

/**
 * Huber's weight of a measure.
 * @param distance d, ≥ 0.
 * @param scale s of its sort; 0 where the fit is exact.
 * @param isPair whether the measure has two rows.
 * @returns between 1e-8 and 1.
 * Source: Huber 1964, Annals of Mathematical Statistics 35, 73.
 */
export function huberWeight(distance: number, scale: number, isPair: boolean): number {
  const reach = (isPair ? HUBER_PAIR : HUBER_SINGLE) * scale
  return distance > reach ? Math.max(SMALLEST_WEIGHT, reach / distance) : 1
}

/**
 * Sum of the smallest three quarters of d².
 * @param distances d of each measure.
 * @returns the trimmed sum.
 * Source: Rousseeuw 1984, Journal of the American Statistical Association 79, 871.
 */
export function trimmedSum(distances: ArrayLike<number>): number {
  const squares = Array.from(distances, (d) => d * d).sort((a, b) => a - b)
  let sum = 0
  for (let i = 0; i < Math.floor(squares.length * TRIMMED_PART); i++) sum += squares[i]!
  return sum
}
