import type { Element } from '../../fitting/types'
import { formatJulianDate } from './date-text'
import { decimalsOf, formatDigits, formatNumber } from './number-text'
import { unitSymbol } from './unit-symbol'

/** A value beside its standard error, both with the same decimals: the error keeps two significant digits. */
export interface ValueAndSigma {
  value: string
  /** Without ±; null where no error is known. */
  sigma: string | null
}

const SIGMA_DIGITS = 2
const MOST_DECIMALS = 9
const DIGITS_WITHOUT_SIGMA = 5

/**
 * The decimals with which a value and its standard error are written.
 * @param sigma standard error in the unit of the value; null, 0 or not finite where none is known
 * @returns decimals so that the error keeps two significant digits, at most 9; null where none is known; below 0 for tens and hundreds
 */
export function decimalsForSigma(sigma: number | null): number | null {
  if (sigma === null || !(sigma > 0) || !Number.isFinite(sigma)) return null
  return Math.min(MOST_DECIMALS, decimalsOf(Number(sigma.toPrecision(SIGMA_DIGITS)), SIGMA_DIGITS))
}

/**
 * Writes a value and its standard error with the same decimals.
 * @param value in any unit
 * @param sigma standard error in the same unit; null where none is known
 * @returns such as { value: "62.41", sigma: "0.38" }; an error below 1e-9 is written "<0.000000001"; without an error five significant
 * digits, zeros at their end left out
 */
export function formatValueAndSigma(value: number, sigma: number | null): ValueAndSigma {
  const decimals = decimalsForSigma(sigma)
  if (sigma === null || decimals === null) {
    return { value: formatDigits(value, DIGITS_WITHOUT_SIGMA).replace(/(\.\d*?)0+$/, '$1').replace(/\.$/, ''), sigma: null }
  }
  const sigmaText = formatNumber(sigma, decimals)
  return { value: formatNumber(value, decimals), sigma: Number(sigmaText) === 0 ? `<${formatNumber(10 ** -MOST_DECIMALS, MOST_DECIMALS)}` : sigmaText }
}

/**
 * Writes an element of a fit in one piece.
 * @param element value and error to publish, with their unit
 * @returns such as "62.41 ± 0.38 yr", "78.1 ± 0.4°", "0.482" where no error is known
 */
export function formatElement(element: Element): string {
  const { value, sigma } = formatValueAndSigma(element.value, element.sigma)
  return withUnit(sigma === null ? value : `${value} ± ${sigma}`, element.unit)
}

/**
 * Puts a unit behind a number as the trade does: degrees and arcseconds close up, others after a space.
 * @param text the number as written
 * @param unit the unit's name, such as "arcsec"; empty for none
 * @returns such as "0.861″" or "62.41 yr"
 */
export function withUnit(text: string, unit: string): string {
  const symbol = unitSymbol(unit)
  if (symbol === '') return text
  return /^[°′″]/.test(symbol) ? `${text}${symbol}` : `${text} ${symbol}`
}

/**
 * Writes an element for a table, whose column of units is narrow: of a Julian date the year and month, of a magnitude the passband
 * go to the words, so that a number and a short unit stay.
 * @param element value and error to publish, with their unit
 * @returns value and σ with the same decimals, the sign of the unit, and what is added to the words:
 * "12.314", "0.021", "d" and "2026 Apr"; no addition for any other unit
 */
export function elementCells(element: Element): ValueAndSigma & { unit: string, addition: string } {
  const { value, sigma } = formatValueAndSigma(element.value, element.sigma)
  if (element.unit.startsWith('mag ')) return { value, sigma, unit: 'mag', addition: element.unit.slice('mag '.length) }
  if (element.unit !== 'JD TT') return { value, sigma, unit: unitSymbol(element.unit), addition: '' }
  const decimals = Math.min(6, Math.max(0, decimalsForSigma(element.sigma) ?? 2))
  const [year = '', month = '', day = ''] = formatJulianDate(element.value, decimals).split(' ')
  return { value: day, sigma, unit: 'd', addition: `${year} ${month}` }
}
