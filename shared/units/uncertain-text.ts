/** Numbers with their standard errors as pages, mail and lists write them. */

const SIGMA_DIGITS = 2
const DIGITS_WITHOUT_SIGMA = 5
/** toFixed takes no more. */
const MOST_DECIMALS = 20

/**
 * Tells how many decimals a value with this error is written with: the error has two significant digits.
 * @param sigma standard error, in the unit of the value
 * @returns 0 to 20; null where there is no usable error (null, 0, not finite)
 */
export function decimalsFor(sigma: number | null): number | null {
  if (sigma === null || !Number.isFinite(sigma) || sigma <= 0) return null
  const exponent = Number(sigma.toExponential(SIGMA_DIGITS - 1).split('e')[1])
  return Math.min(MOST_DECIMALS, Math.max(0, SIGMA_DIGITS - 1 - exponent))
}

/**
 * Writes a value with its error, both with the same decimals, such as "62.41 ± 0.38".
 * @param value finite number
 * @param sigma standard error in the same unit; null where unknown
 * @returns the value alone, to five significant digits, where there is no usable error
 * @throws RangeError where the value is not finite
 */
export function formatUncertain(value: number, sigma: number | null): string {
  const decimals = decimalsFor(sigma)
  return sigma === null || decimals === null ? formatValue(value, sigma) : `${formatValue(value, sigma)} ± ${sigma.toFixed(decimals)}`
}

/**
 * Writes a value with the decimals that its error allows, without the error.
 * @param value finite number
 * @param sigma standard error in the same unit; null where unknown
 * @returns such as "62.41"; a true minus sign before negative numbers
 * @throws RangeError where the value is not finite
 */
export function formatValue(value: number, sigma: number | null): string {
  if (!Number.isFinite(value)) throw new RangeError(`not a finite number: ${value}`)
  const decimals = decimalsFor(sigma)
  const text = decimals === null ? withoutTrailingZeros(value) : value.toFixed(decimals)
  return /^-[0.]*$/.test(text) ? text.slice(1) : text.replace('-', '−')
}

function withoutTrailingZeros(value: number): string {
  const text = value.toPrecision(DIGITS_WITHOUT_SIGMA)
  return text.includes('.') && !text.includes('e') ? text.replace(/\.?0+$/, '') : text
}
