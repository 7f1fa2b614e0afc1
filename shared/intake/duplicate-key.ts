import { nameKey } from './name-key'
import type { ParsedRow } from './parsed-row'

/** A millionth of a year is half a minute: closer than that, two epochs are one. */
const EPOCH_DECIMALS = 6
/** Bodies near the Earth are measured every few seconds. */
const SECOND_MS = 1000
/** A place in degrees and the same place in hours, minutes and seconds differ by their rounding, a few thousandths of an arcsecond. */
const PLACE_DECIMALS = 5
/** Digits that survive every way of writing a number. */
const VALUE_DIGITS = 12

/**
 * The key by which a measure is known to be here already: observer, time and measured values, as numbers and not as text, so
 * that 62.40 and 62.4 are one. Standard errors and remarks do not count. Compare it within one target.
 */
export function duplicateKey(row: ParsedRow, observerName: string): string {
  return [row.kind, nameKey(observerName), timeKey(row), ...valueKeys(row)].join('|')
}

function timeKey(row: ParsedRow): string {
  if (row.kind === 'equatorial') return String(Math.round(Date.parse(row.timeUtc) / SECOND_MS))
  return row.epochYr === null ? '' : row.epochYr.toFixed(EPOCH_DECIMALS)
}

function valueKeys(row: ParsedRow): string[] {
  if (row.kind === 'equatorial') return [row.raDeg.toFixed(PLACE_DECIMALS), row.decDeg.toFixed(PLACE_DECIMALS)]
  const values = row.kind === 'relative'
    ? [row.thetaDeg, row.rhoArcsec, row.eastArcsec, row.northArcsec, row.rhoLimitArcsec]
    : [row.phiDeg, row.r, row.diameterArcmin]
  return values.map(normalised)
}

function normalised(value: number | null): string {
  return value === null ? '' : String(Number(value.toPrecision(VALUE_DIGITS)))
}
