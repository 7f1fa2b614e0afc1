/**
 * Incomplete gamma and beta functions, each with its complement, to about 2e-15.
 *
 * Both are a leading factor times a series or a continued fraction. The factor is where precision is lost; it is written with Stirling's
 * remainder δ(a) = ln Γ(a+1) − (a+½) ln a + a − ½ ln 2π and the deviance D(a, x) = a·ln(a/x) + x − a, so that no large logarithms cancel:
 *   xᵃe⁻ˣ/Γ(a+1) = exp(−δ(a) − D(a, x))/√(2πa)
 *
 * Sources: Loader 2000, Fast and Accurate Computation of Binomial Probabilities (leading factor); Abramowitz & Stegun 1964, Handbook of
 * Mathematical Functions, 6.5.29, 6.5.31; Thompson & Barnett 1986, J. Comput. Phys. 64, 490
 * (continued fraction of gamma); DiDonato & Morris 1992, Significant digit computation of the incomplete beta function ratios (of beta).
 */
import { exp, log1p, log, TWO_PI } from '../elementary'

const MOST_TERMS = 100_000
const SETTLED = 3e-16
const NOT_ZERO = 1e-300
const ASYMPTOTIC_FROM = 16

/** A share and its complement: lower + upper = 1. */
export interface Shares {
  lower: number
  upper: number
}

/** Stirling's remainder δ(a), a > 0: its asymptotic series from a ≥ 16, reached by δ(a) = δ(a+1) + (a+½)·ln(1+1/a) − 1. */
function stirlingRemainder(a: number): number {
  let raised = a
  let sum = 0
  for (; raised < ASYMPTOTIC_FROM; raised++) sum += (raised + 0.5) * log1p(1 / raised) - 1
  const z = 1 / (raised * raised)
  return sum + (1 / 12 - z * (1 / 360 - z * (1 / 1260 - z * (1 / 1680 - z * (1 / 1188 - z * (691 / 360360 - z / 156)))))) / raised
}

/** Deviance D(a, x) = a·ln(a/x) + x − a ≥ 0, a > 0, x > 0. */
function deviance(a: number, x: number): number {
  const t = (x - a) / a
  if (t > 0.25 || t < -0.2) return x - a - a * log(x / a)
  const s = t / (2 + t)
  const z = s * s
  let sum = 0
  let power = z
  for (let n = 3; n < 60; n += 2) {
    sum += power / n
    power *= z
    if (power < 1e-18) break
  }
  return a * (t * s - 2 * s * sum)
}

/**
 * Leading factor of the incomplete gamma function.
 * @param a > 0.
 * @param x > 0.
 * @returns xᵃe⁻ˣ/Γ(a+1).
 * Source: Loader 2000, Fast and Accurate Computation of Binomial Probabilities.
 */
export function gammaFactor(a: number, x: number): number {
  return exp(-stirlingRemainder(a) - deviance(a, x)) / Math.sqrt(TWO_PI * a)
}

/**
 * Incomplete gamma function, regularised.
 * @param a > 0.
 * @param x ≥ 0.
 * @returns P(a, x) as lower and Q(a, x) as upper; NaN outside the ranges.
 * Source: Abramowitz & Stegun 1964, Handbook of Mathematical Functions, 6.5.29 and 6.5.31.
 */
export function incompleteGamma(a: number, x: number): Shares {
  if (!(a > 0 && a < Infinity && x >= 0)) return { lower: NaN, upper: NaN }
  if (x === 0) return { lower: 0, upper: 1 }
  if (x === Infinity) return { lower: 1, upper: 0 }
  const factor = gammaFactor(a, x)
  if (x < a + 1) {
    let term = 1
    let sum = 1
    for (let n = 1; n < MOST_TERMS; n++) {
      term *= x / (a + n)
      sum += term
      if (term < sum * SETTLED) break
    }
    return { lower: factor * sum, upper: 1 - factor * sum }
  }
  const upper = factor * a * gammaFraction(a, x)
  return { lower: 1 - upper, upper }
}

/** Continued fraction of Γ(a, x)·eˣ·x⁻ᵃ, x ≥ a + 1. */
function gammaFraction(a: number, x: number): number {
  let b = x + 1 - a
  let c = 1 / NOT_ZERO
  let d = 1 / b
  let value = d
  for (let n = 1; n < MOST_TERMS; n++) {
    const numerator = -n * (n - a)
    b += 2
    d = 1 / notZero(numerator * d + b)
    c = notZero(b + numerator / c)
    value *= c * d
    if (Math.abs(c * d - 1) < SETTLED) break
  }
  return value
}

/**
 * Leading factor of the incomplete beta function.
 * @param a > 0.
 * @param b > 0.
 * @param x in (0, 1).
 * @param y 1 − x, given apart so that it keeps its figures.
 * @returns xᵃyᵇ/(a·B(a, b)).
 * Source: Loader 2000, Fast and Accurate Computation of Binomial Probabilities.
 */
export function betaFactor(a: number, b: number, x: number, y: number): number {
  const n = a + b
  const exponent = stirlingRemainder(n) - stirlingRemainder(a) - stirlingRemainder(b) - deviance(a, n * x) - deviance(b, n * y)
  return exp(exponent) * Math.sqrt(n / (TWO_PI * a * b)) * (b / n)
}

/**
 * Incomplete beta function, regularised.
 * @param a > 0.
 * @param b > 0.
 * @param x in [0, 1].
 * @param y 1 − x, given apart so that it keeps its figures.
 * @returns I_x(a, b) as lower and I_y(b, a) as upper; NaN outside the ranges.
 * Source: DiDonato & Morris 1992, Significant digit computation of the incomplete beta function ratios, eq. 9.
 */
export function incompleteBeta(a: number, b: number, x: number, y: number): Shares {
  if (!(a > 0 && b > 0 && a + b < Infinity && x >= 0 && y >= 0)) return { lower: NaN, upper: NaN }
  if (x === 0) return { lower: 0, upper: 1 }
  if (y === 0) return { lower: 1, upper: 0 }
  if (x * b <= a * y) {
    const lower = a * betaFactor(a, b, x, y) * betaFraction(a, b, x, y)
    return { lower, upper: 1 - lower }
  }
  const upper = b * betaFactor(b, a, y, x) * betaFraction(b, a, y, x)
  return { lower: 1 - upper, upper }
}

/**
 * Continued fraction of I_x(a, b)·B(a, b)/(xᵃyᵇ) for x ≤ a/(a + b), in the even form, which does not cancel where x is near 1: the first
 * denominator is λ = a − (a + b)·x, taken from whichever of x and y is the smaller.
 */
function betaFraction(a: number, b: number, x: number, y: number): number {
  const lambda = x < y ? a - (a + b) * x : (a + b) * y - b
  // Numerator and denominator of the convergent before, in units of the present denominator.
  let numerator = 0
  let denominator = (a + 1) / ((1 + lambda) * a)
  let value = denominator
  for (let n = 1; n < MOST_TERMS; n++) {
    const place = a + 2 * n - 1
    const drift = n * (b - n) * x
    const alpha = (a + n - 1) * (a + b + n - 1) * drift * x / (place * place)
    const beta = n + drift / place + (a + n) / (place + 2) * (1 + lambda + n * (1 + y))
    const nextDenominator = alpha * denominator + beta
    const nextValue = (alpha * numerator + beta * value) / nextDenominator
    numerator = value / nextDenominator
    denominator = 1 / nextDenominator
    const change = Math.abs(nextValue - value)
    value = nextValue
    if (change <= SETTLED * value) break
  }
  return value
}

function notZero(value: number): number {
  return Math.abs(value) < NOT_ZERO ? NOT_ZERO : value
}
