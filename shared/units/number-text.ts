/** Plain numbers as pages, mail and drawings write them: a dot, no thousands separator, a real minus sign. */

/** U+2212, as long as a plus sign; the hyphen is not. */
export const MINUS = '−'
const MOST_DECIMALS = 15

/**
 * Writes a number with a fixed count of decimals.
 * @param value any finite number
 * @param decimals 0 to 15; below 0 the number is rounded to tens (−1), hundreds (−2) and so on
 * @returns such as "−4.66"; "0.00" and never "−0.00"; "—" where the value is not finite
 */
export function formatNumber(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return '—'
  const rounded = decimals < 0 ? Math.round(value / 10 ** -decimals) * 10 ** -decimals : value
  const digits = Math.abs(rounded).toFixed(Math.min(MOST_DECIMALS, Math.max(0, decimals)))
  return rounded < 0 && Number(digits) !== 0 ? `${MINUS}${digits}` : digits
}

/**
 * Writes a number with its sign in any case, as residuals are written.
 * @param value any finite number
 * @param decimals 0 to 15
 * @returns such as "+0.021" or "−4.66"; "0.000" without a sign where nothing is left after rounding; "—" where the value is not finite
 */
export function formatSigned(value: number, decimals: number): string {
  const text = formatNumber(value, decimals)
  return value > 0 && Number(text) !== 0 ? `+${text}` : text
}

/**
 * Writes a number to a count of significant digits, without an exponent where that stays readable.
 * @param value any finite number
 * @param digits significant digits, 1 to 15
 * @returns such as "0.0482", "188" or "4.1e-9"; "—" where the value is not finite
 */
export function formatDigits(value: number, digits: number): string {
  if (!Number.isFinite(value)) return '—'
  const text = Math.abs(value).toPrecision(digits)
  const size = Math.abs(Number(text))
  const plain = size !== 0 && (size < 1e-6 || size >= 1e9) ? text : formatNumber(Math.abs(value), decimalsOf(size, digits))
  return value < 0 && size !== 0 ? `${MINUS}${plain}` : plain
}

/**
 * How many decimals show a number to a count of significant digits.
 * @param size the number, already rounded to those digits, > 0 (0 counts as one)
 * @param digits significant digits, ≥ 1
 * @returns decimals, below 0 for tens and hundreds
 */
export function decimalsOf(size: number, digits: number): number {
  return size === 0 ? digits - 1 : digits - 1 - Math.floor(Math.log10(size) + 1e-12)
}
