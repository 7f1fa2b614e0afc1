import * as rules from './number-rules'
import type { ParsedPlaneRow } from './parsed-row'
import { FIRST_YEAR, LAST_YEAR } from './read-epoch'
import { readTime } from './read-time'
import type { RowReader } from './row-reader'
import { EPOCH_SENTENCES, POSITION_SENTENCES } from './sentences'

/** Reads one row of positions in the plane of an orbit; null where something in it is wrong. */
export function readPlaneRow(row: RowReader, nowYr?: number): ParsedPlaneRow | null {
  const time = readOptionalTime(row, nowYr)
  const phi = row.number('phi_deg', rules.direction)
  if (!row.isFilled('phi_deg')) row.problems.error('phi_deg', null, POSITION_SENTENCES.planeDirection())
  const hasR = row.isFilled('r')
  const hasDiameter = row.isFilled('diameter_arcmin')
  if (!hasR && !hasDiameter) row.problems.error('r', null, POSITION_SENTENCES.planeNothing())
  if (hasR && hasDiameter) row.complain('diameter_arcmin', POSITION_SENTENCES.planeBoth())
  const rest = {
    r: row.number('r', rules.positive),
    sigmaR: hasR ? row.number('sigma_r', rules.standardError) : null,
    diameterArcmin: row.number('diameter_arcmin', rules.positive),
    sigmaDiameterArcmin: hasDiameter ? row.number('sigma_diameter_arcmin', rules.standardError) : null,
    targetName: row.text('target'),
    observerName: row.text('observer'),
    remarks: row.text('remarks'),
  }
  if (row.problems.hasErrors || phi === null) return null
  return { kind: 'plane', ...time, phiDeg: phi === rules.FULL_TURN_DEG ? 0 : phi, ...rest }
}

function readOptionalTime(row: RowReader, nowYr?: number): Pick<ParsedPlaneRow, 'epochYr' | 'timeUtc'> {
  const none = { epochYr: null, timeUtc: null }
  const written = row.written('time_utc')
  if (written === '') return none
  const read = readTime(written)
  if (!read.ok) {
    row.complain('time_utc', read.complaint)
    return none
  }
  const { epochYr, iso } = read.time
  if (epochYr < FIRST_YEAR || epochYr > LAST_YEAR) {
    row.complain('time_utc', EPOCH_SENTENCES.yearRange())
    return none
  }
  if (nowYr !== undefined && epochYr > nowYr) row.note('time_utc', EPOCH_SENTENCES.inFuture())
  return { epochYr, timeUtc: iso }
}
