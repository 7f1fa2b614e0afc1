/**
 * Residuals of measures on the sky: observed minus computed by coordinate, whitened rows, influence, and the measure carried back
 * into the plane of the orbit.
 *   across = ρ_c Δθ,  along = Δρ,  Δθ wrapped to ±180° (±90° where the quadrant is ambiguous)
 */
import { atan2, cos, hypot, RAD, sin } from '../elementary'
import { withinTurn } from '../conic/thiele-innes'
import { wrapToHalfTurn } from '../models/relative-kepler'
import type { SkyMeasure } from '../models/sky-measure'
import type { SkyPath } from '../models/sky-path'
import { evaluateRow, rowBuffer, skyRow } from '../models/sky-rows'
import type { Residual } from '../types'
import { influenceOf } from './influence'

/** Places the measure in the plane of the orbit; null where that is not possible. */
export type CarryBack = (northArcsec: number, eastArcsec: number) => Residual['inOrbitPlane']

export interface SkyResidualContext {
  path: SkyPath
  values: ArrayLike<number>
  covariance: number[][] | null
  /** s² = χ²/ν; null without degrees of freedom. */
  scaleSquared: number | null
  carryBack: CarryBack
}

interface Place {
  north: number
  east: number
  thetaRad: number
  rho: number
}

/** The observed place with its quadrant as the fit takes it. */
function observedPlace(m: SkyMeasure, computed: Place): Place {
  if (m.form === 'rectangular') return { north: m.north, east: m.east, thetaRad: m.thetaRad, rho: m.rhoArcsec }
  const difference = m.thetaRad - computed.thetaRad
  const thetaRad = computed.thetaRad + (m.isAmbiguous ? wrapToHalfTurn(2 * difference) / 2 : wrapToHalfTurn(difference))
  return { north: NaN, east: NaN, thetaRad, rho: m.form === 'limit' ? NaN : m.rhoArcsec }
}

const orNull = (value: number): number | null => (value - value === 0 ? value : null)

function differences(m: SkyMeasure, computed: Place): Residual['observedMinusComputed'] {
  const observed = observedPlace(m, computed)
  const deltaTheta = wrapToHalfTurn(observed.thetaRad - computed.thetaRad)
  const deltaRho = observed.rho - computed.rho
  const isPolar = m.form !== 'rectangular'
  return {
    thetaDeg: isPolar ? orNull(deltaTheta * RAD) : null,
    rhoArcsec: isPolar ? orNull(deltaRho) : null,
    eastArcsec: orNull(observed.east - computed.east),
    northArcsec: orNull(observed.north - computed.north),
    acrossArcsec: orNull(deltaTheta * computed.rho),
    alongArcsec: orNull(deltaRho),
  }
}

function carriedBack(m: SkyMeasure, computed: Place, carryBack: CarryBack): Residual['inOrbitPlane'] {
  if (m.form === 'rectangular') return carryBack(m.north, m.east)
  if (m.form !== 'polar') return null
  const theta = observedPlace(m, computed).thetaRad
  return carryBack(m.rhoArcsec * cos(theta), m.rhoArcsec * sin(theta))
}

/**
 * Residual of one measure at the solution.
 * @param measure any form; a limit gets its computed place only.
 * @param context path, parameters, covariance of unit variance, s², and the way back into the plane of the orbit.
 * @returns the residual; leverage and Cook's distance for used measures only.
 */
export function skyResidual(measure: SkyMeasure, context: SkyResidualContext): Residual {
  const { path, values, covariance, scaleSquared } = context
  const p = path.parameters
  const position = new Float64Array(2 + 2 * p)
  path.prepare(values)
  path.at(measure.epochYr, position, true)
  const north = position[0]!
  const east = position[1]!
  const computed: Place = { north, east, thetaRad: atan2(east, north), rho: hypot(north, east) }
  const isFitted = measure.form !== 'limit'
  const row = isFitted ? skyRow({ ...measure, robustWeight: 1 }, computed.rho) : null
  const buffer = rowBuffer()
  const rows = row !== null && evaluateRow(row, north, east, buffer) ? [buffer.r1, buffer.r2].slice(0, row.rows) : []
  const root = Math.sqrt(measure.robustWeight)
  const gradients = [[buffer.r1x, buffer.r1y], [buffer.r2x, buffer.r2y]].slice(0, rows.length)
    .map(([byX, byY]) => Float64Array.from({ length: p }, (_, j) => root * (byX! * position[2 + j]! + byY! * position[2 + p + j]!)))
  const isUsed = measure.status === 'used' && covariance !== null && rows.length > 0
  const influence = isUsed ? influenceOf({ residuals: rows.map((r) => r * root), gradients }, covariance, scaleSquared) : null
  return {
    id: measure.id,
    status: measure.status,
    computed: { thetaDeg: withinTurn(computed.thetaRad) * RAD, rhoArcsec: computed.rho, eastArcsec: east, northArcsec: north },
    observedMinusComputed: differences(measure, computed),
    normalised: rows.length > 0 ? Math.sqrt(rows.reduce((sum, r) => sum + r * r, 0)) : null,
    rows,
    weight: measure.status === 'used' ? measure.weight * measure.robustWeight : 0,
    leverage: influence?.leverage ?? null,
    cook: influence?.cook ?? null,
    inOrbitPlane: carriedBack(measure, computed, context.carryBack),
  }
}
