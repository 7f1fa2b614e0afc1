/**
 * Distribution functions and quantiles of the normal, χ², F and Student's t distributions.
 *
 * Symbols: x argument, p probability in [0, 1], k degrees of freedom (> 0, not necessarily whole). Both tails are computed directly, so
 * that small upper tails keep their figures. Quantiles solve ln(tail) = ln(target) by Newton's method in ln x, kept in a bracket.
 *
 * Source: Abramowitz & Stegun 1964, Handbook of Mathematical Functions, ch. 26.
 */
import { exp, log } from '../elementary'
import type { Shares } from './special-functions'
import { betaFactor, gammaFactor, incompleteBeta, incompleteGamma } from './special-functions'

const MOST_STEPS = 200

/**
 * Shares of a χ² distribution below and above x.
 * @param x ≥ 0.
 * @param degrees k, > 0.
 * @returns lower (the distribution function) and upper; NaN outside the ranges.
 * Source: Abramowitz & Stegun 1964, 26.4.
 */
export function chiSquareShares(x: number, degrees: number): Shares {
  return incompleteGamma(degrees / 2, x / 2)
}

/**
 * Shares of an F distribution below and above x.
 * @param x ≥ 0.
 * @param degreesAbove k₁ of the numerator, > 0.
 * @param degreesBelow k₂ of the denominator, > 0.
 * @returns lower (the distribution function) and upper; NaN outside the ranges.
 * Source: Abramowitz & Stegun 1964, 26.6.
 */
export function fShares(x: number, degreesAbove: number, degreesBelow: number): Shares {
  if (x === Infinity) return incompleteBeta(degreesAbove / 2, degreesBelow / 2, 1, 0)
  const sum = degreesAbove * x + degreesBelow
  return incompleteBeta(degreesAbove / 2, degreesBelow / 2, degreesAbove * x / sum, degreesBelow / sum)
}

/**
 * Shares of the standard normal distribution below and above x.
 * @param x any number.
 * @returns lower (the distribution function) and upper; NaN for NaN.
 * Source: Abramowitz & Stegun 1964, 26.2, by χ² of one degree of freedom.
 */
export function normalShares(x: number): Shares {
  return halves(x, chiSquareShares(x * x, 1))
}

/**
 * Shares of Student's t distribution below and above x.
 * @param x any number.
 * @param degrees k, > 0.
 * @returns lower (the distribution function) and upper; NaN outside the ranges.
 * Source: Abramowitz & Stegun 1964, 26.7, by F of 1 and k degrees of freedom.
 */
export function studentShares(x: number, degrees: number): Shares {
  return halves(x, fShares(x * x, 1, degrees))
}

/** Shares of a symmetric variable from those of its square. */
function halves(x: number, square: Shares): Shares {
  const tail = 0.5 * square.upper
  const rest = 0.5 + 0.5 * square.lower
  return x > 0 ? { lower: rest, upper: tail } : { lower: tail, upper: rest }
}

/**
 * Quantile of a χ² distribution.
 * @param p probability below it, 0 to 1.
 * @param degrees k, > 0.
 * @returns x ≥ 0, relative 1e-13; Infinity at p = 1; NaN outside the ranges.
 * Source: Abramowitz & Stegun 1964, 26.4.
 */
export function chiSquareQuantile(p: number, degrees: number): number {
  return quantile(chiSquareFamily(degrees), tailOf(p))
}

/**
 * Quantile of an F distribution.
 * @param p probability below it, 0 to 1.
 * @param degreesAbove k₁ of the numerator, > 0.
 * @param degreesBelow k₂ of the denominator, > 0.
 * @returns x ≥ 0, relative 1e-13; Infinity at p = 1; NaN outside the ranges.
 * Source: Abramowitz & Stegun 1964, 26.6.
 */
export function fQuantile(p: number, degreesAbove: number, degreesBelow: number): number {
  return quantile(fFamily(degreesAbove, degreesBelow), tailOf(p))
}

/**
 * Quantile of the standard normal distribution.
 * @param p probability below it, 0 to 1.
 * @returns x, relative 1e-13; ±Infinity at 1 and 0; NaN outside the range.
 * Source: Abramowitz & Stegun 1964, 26.2.
 */
export function normalQuantile(p: number): number {
  return symmetricQuantile(chiSquareFamily(1), p)
}

/**
 * Quantile of Student's t distribution.
 * @param p probability below it, 0 to 1.
 * @param degrees k, > 0.
 * @returns x, relative 1e-13; ±Infinity at 1 and 0; NaN outside the ranges.
 * Source: Abramowitz & Stegun 1964, 26.7.
 */
export function studentQuantile(p: number, degrees: number): number {
  return symmetricQuantile(fFamily(1, degrees), p)
}

/** A distribution on x > 0: its shares and x times its density. */
interface Family {
  isDefined: boolean
  shares: (x: number) => Shares
  densityTimesX: (x: number) => number
}

interface Tail {
  isUpper: boolean
  share: number
}

function chiSquareFamily(degrees: number): Family {
  return {
    isDefined: degrees > 0 && degrees < Infinity,
    shares: x => chiSquareShares(x, degrees),
    densityTimesX: x => degrees / 2 * gammaFactor(degrees / 2, x / 2),
  }
}

function fFamily(degreesAbove: number, degreesBelow: number): Family {
  const a = degreesAbove / 2
  const b = degreesBelow / 2
  return {
    isDefined: a > 0 && b > 0 && a + b < Infinity,
    shares: x => fShares(x, degreesAbove, degreesBelow),
    densityTimesX: (x) => {
      const sum = a * x + b
      return a * betaFactor(a, b, a * x / sum, b / sum)
    },
  }
}

function tailOf(p: number): Tail {
  return p > 0.5 ? { isUpper: true, share: 1 - p } : { isUpper: false, share: p }
}

/** Of a variable whose square has the given distribution. */
function symmetricQuantile(square: Family, p: number): number {
  if (p === 0.5) return square.isDefined ? 0 : NaN
  const outside = 2 * (p < 0.5 ? p : 1 - p)
  const tail = outside < 0.5 ? { isUpper: true, share: outside } : { isUpper: false, share: 2 * Math.abs(p - 0.5) }
  const size = Math.sqrt(quantile(square, tail))
  return p < 0.5 ? -size : size
}

function quantile(family: Family, tail: Tail): number {
  if (!family.isDefined || !(tail.share >= 0 && tail.share <= 1)) return NaN
  if (tail.share === 0) return tail.isUpper ? Infinity : 0
  const target = log(tail.share)
  let low = -700
  let high = 700
  let u = 0
  for (let n = 0; n < MOST_STEPS; n++) {
    const x = exp(u)
    const shares = family.shares(x)
    const share = tail.isUpper ? shares.upper : shares.lower
    const excess = log(share) - target
    if (excess > 0 === tail.isUpper) low = u
    else high = u
    const slope = (tail.isUpper ? -1 : 1) * family.densityTimesX(x) / share
    const newton = u - excess / slope
    const next = newton > low && newton < high ? newton : 0.5 * (low + high)
    if (Math.abs(next - u) <= 1e-15 || next === u) return exp(next)
    u = next
  }
  return exp(u)
}
