import type { MeasureColumn } from './columns'
import * as rules from './number-rules'
import type { ParsedRelativeRow } from './parsed-row'
import type { RowReader } from './row-reader'
import { POSITION_SENTENCES, VALUE_SENTENCES } from './sentences'

export type RelativePosition = Pick<ParsedRelativeRow,
  'thetaDeg' | 'rhoArcsec' | 'sigmaThetaDeg' | 'sigmaRhoArcsec' | 'eastArcsec' | 'northArcsec' | 'sigmaEastArcsec' | 'sigmaNorthArcsec'
  | 'rhoLimitArcsec' | 'correlation'>

const NO_POSITION: RelativePosition = {
  thetaDeg: null, rhoArcsec: null, sigmaThetaDeg: null, sigmaRhoArcsec: null, eastArcsec: null, northArcsec: null,
  sigmaEastArcsec: null, sigmaNorthArcsec: null, rhoLimitArcsec: null, correlation: null,
}

/** Where the companion was seen, in whichever of three forms the row gives it: θ and ρ, east and north, or a limit. */
export function readRelativePosition(row: RowReader): RelativePosition | null {
  const hasPolar = row.isFilled('theta_deg') || row.isFilled('rho_arcsec')
  const hasRectangular = row.isFilled('east_arcsec') || row.isFilled('north_arcsec')
  const hasLimit = row.isFilled('rho_limit_arcsec')
  if (!hasPolar && !hasRectangular && !hasLimit) {
    row.problems.error(null, null, POSITION_SENTENCES.nothing())
    return null
  }
  const polar = hasPolar ? readPolar(row) : null
  const rectangular = hasRectangular ? readRectangular(row) : null
  const limit = hasLimit ? { ...NO_POSITION, rhoLimitArcsec: row.number('rho_limit_arcsec', rules.separation) } : null
  if (limit && (polar || rectangular)) row.complain('rho_limit_arcsec', POSITION_SENTENCES.limitAndPosition())
  if (polar && rectangular && !row.problems.hasErrors) compareForms(row, polar, rectangular)
  return rectangular ?? polar ?? limit
}

function readPolar(row: RowReader): RelativePosition {
  const theta = row.number('theta_deg', rules.direction)
  if (theta === rules.FULL_TURN_DEG) row.note('theta_deg', VALUE_SENTENCES.angleFullTurn())
  return {
    ...NO_POSITION,
    thetaDeg: theta === rules.FULL_TURN_DEG ? 0 : theta,
    rhoArcsec: row.number('rho_arcsec', rules.separation),
    sigmaThetaDeg: readSigma(row, 'sigma_theta_deg', 'theta_deg'),
    sigmaRhoArcsec: readSigma(row, 'sigma_rho_arcsec', 'rho_arcsec'),
    correlation: readCorrelation(row, 'corr_theta_rho', 'sigma_theta_deg', 'sigma_rho_arcsec'),
  }
}

function readRectangular(row: RowReader): RelativePosition {
  for (const [given, missing] of [['east_arcsec', 'north_arcsec'], ['north_arcsec', 'east_arcsec']] as const) {
    if (!row.isFilled(missing)) row.complain(given, POSITION_SENTENCES.halfRectangular(given, missing))
  }
  return {
    ...NO_POSITION,
    eastArcsec: row.number('east_arcsec'),
    northArcsec: row.number('north_arcsec'),
    sigmaEastArcsec: readSigma(row, 'sigma_east_arcsec', 'east_arcsec'),
    sigmaNorthArcsec: readSigma(row, 'sigma_north_arcsec', 'north_arcsec'),
    correlation: readCorrelation(row, 'corr_east_north', 'sigma_east_arcsec', 'sigma_north_arcsec'),
  }
}

function readSigma(row: RowReader, column: MeasureColumn, of: MeasureColumn): number | null {
  const sigma = row.number(column, rules.standardError)
  if (sigma === null || row.isFilled(of)) return sigma
  row.note(column, VALUE_SENTENCES.sigmaWithoutValue(of))
  return null
}

function readCorrelation(row: RowReader, column: MeasureColumn, first: MeasureColumn, second: MeasureColumn): number | null {
  const value = row.number(column, rules.correlation)
  if (value !== null && !(row.isFilled(first) && row.isFilled(second))) row.complain(column, VALUE_SENTENCES.correlationNeedsSigmas(first, second))
  return value
}

/** Half a percent of the separation: what rounding of a published table can make. */
const SAME_POSITION = 0.005
const RAD_A_DEG = Math.PI / 180

/** Tables often give a position in both forms; that is fine as long as they agree. */
function compareForms(row: RowReader, polar: RelativePosition, rectangular: RelativePosition): void {
  const east = rectangular.eastArcsec ?? 0
  const north = rectangular.northArcsec ?? 0
  const separation = Math.hypot(east, north)
  const theta = polar.thetaDeg === null ? Math.atan2(east, north) : polar.thetaDeg * RAD_A_DEG
  const rho = polar.rhoArcsec ?? separation
  const apart = Math.hypot(east - rho * Math.sin(theta), north - rho * Math.cos(theta))
  const column = polar.thetaDeg === null ? 'rho_arcsec' : 'theta_deg'
  if (apart <= SAME_POSITION * separation) row.note(column, POSITION_SENTENCES.polarRepeats())
  else row.complain(column, POSITION_SENTENCES.polarAndRectangular())
}
