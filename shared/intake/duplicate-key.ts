import { nameKey } from './name-key'
import type { ParsedRow } from './parsed-row'

/** A millionth of a year is half a minute: closer than that, two epochs are one. */
const EPOCH_DECIMALS = 6
/** Digits that survive every way of writing a number. */
const VALUE_DIGITS = 12

/**
 * The key by which a measure is known to be here already: observer, time and measured values, as numbers and not as text, so
 * that 62.40 and 62.4 are one. Standard errors and remarks do not count. Compare it within one target.
 */
export function duplicateKey(row: ParsedRow, observerName: string): string {
  const values = row.kind === 'relative'
    ? [row.thetaDeg, row.rhoArcsec, row.eastArcsec, row.northArcsec, row.rhoLimitArcsec]
    : [row.phiDeg, row.r, row.diameterArcmin]
  const epoch = row.epochYr === null ? '' : row.epochYr.toFixed(EPOCH_DECIMALS)
  return [row.kind, nameKey(observerName), epoch, ...values.map(normalised)].join('|')
}

function normalised(value: number | null): string {
  return value === null ? '' : String(Number(value.toPrecision(VALUE_DIGITS)))
}
