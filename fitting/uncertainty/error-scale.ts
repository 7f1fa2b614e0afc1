/**
 * From the covariance of whitened parameters to the errors that are published.
 *   formal: σ = √(gᵀ C g)      scaled: σ × max(1, √reduced χ²) × t, t the 84.13 % point of Student's t with ν degrees of freedom,
 * so that ± σ holds 68.27 % also where ν is small. Where no measure states an error there is no formal σ, and only the residuals scale.
 * Source: Bevington & Robinson, Data Reduction and Error Analysis (2003), 6.4; Student 1908, Biometrika 6, 1.
 */
import type { Element } from '../types'
import type { ErrorBasis } from '../models/sky-measure'
import { studentQuantile } from './distributions'

/** Probability below +1 σ of a normal distribution. */
const ONE_SIGMA_PROBABILITY = 0.8413447460685429

/** Factors on √(gᵀ C g); null where there is no such error. */
export interface ErrorScale {
  basis: ErrorBasis
  formal: number | null
  scaled: number | null
  /** The one to publish: formal where every σ was stated, else scaled. */
  published: number | null
}

/**
 * Factors for one fit.
 * @param basis whether errors were stated.
 * @param chiSquare at the solution, ≥ 0.
 * @param degreesOfFreedom rows minus parameters, ≥ 0.
 * @returns the factors; scaled is null without degrees of freedom.
 * Source: Bevington & Robinson, Data Reduction and Error Analysis (2003), 6.4.
 */
export function errorScale(basis: ErrorBasis, chiSquare: number, degreesOfFreedom: number): ErrorScale {
  const formal = basis === 'scaled' ? null : 1
  if (degreesOfFreedom <= 0) return { basis, formal, scaled: null, published: basis === 'formal' ? formal : null }
  const scatter = Math.sqrt(chiSquare / degreesOfFreedom)
  const scaled = (basis === 'scaled' ? scatter : Math.max(1, scatter)) * studentQuantile(ONE_SIGMA_PROBABILITY, degreesOfFreedom)
  return { basis, formal, scaled, published: basis === 'formal' ? formal : scaled }
}

/**
 * gᵀ C h.
 * @param covariance p × p.
 * @param g p entries.
 * @param h p entries; g where left out.
 * @returns the form; a variance where h is g.
 */
export function quadraticForm(covariance: readonly (readonly number[])[], g: ArrayLike<number>, h: ArrayLike<number> = g): number {
  let sum = 0
  for (let i = 0; i < covariance.length; i++) {
    if (g[i] === 0) continue
    const row = covariance[i]!
    let inner = 0
    for (let j = 0; j < row.length; j++) if (h[j] !== 0) inner += row[j]! * h[j]!
    sum += g[i]! * inner
  }
  return sum
}

/** A quantity with its gradient by the fitted parameters. */
export interface Quantity {
  value: number
  gradient: ArrayLike<number>
  unit: string
}

function times(sigma: number | null, factor: number | null): number | null {
  if (sigma === null || factor === null) return null
  const product = sigma * factor
  return product < Infinity ? product : null
}

/**
 * A quantity with its standard errors by the delta method.
 * @param quantity value, gradient, unit.
 * @param covariance of the parameters for unit variance; null where there is none.
 * @param scale of this fit.
 * @returns the element; errors are null where they are not determined.
 * Source: propagation of errors, Bevington & Robinson (2003), 3.2.
 */
export function elementOf(quantity: Quantity, covariance: number[][] | null, scale: ErrorScale): Element {
  const variance = covariance === null ? NaN : quadraticForm(covariance, quantity.gradient)
  const sigma = variance >= 0 ? Math.sqrt(variance) : null
  return {
    value: quantity.value,
    sigma: times(sigma, scale.published),
    sigmaFormal: times(sigma, scale.formal),
    sigmaScaled: times(sigma, scale.scaled),
    unit: quantity.unit,
  }
}
