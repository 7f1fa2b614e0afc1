/**
 * Measures in the form the blind search needs: linear in the position, so that the Thiele–Innes constants follow by a linear solve.
 * A measure is its 2 × 2 information matrix M = WᵀW about the observed place o, and v = M o; a position angle alone has an
 * M of rank one; a separation alone is not linear and waits for the last step.
 * Source: variable projection: Golub & Pereyra 1973, SIAM J. Numer. Anal. 10, 413.
 */
import { cos, PI } from '../elementary'
import type { SkyMeasure } from '../models/sky-measure'
import { linearSkyRow } from '../models/sky-rows'

/** Struct of arrays, one entry a measure; x north, y east. */
export interface SearchPoints {
  count: number
  epochsYr: Float64Array
  m11: Float64Array
  m12: Float64Array
  m22: Float64Array
  /** v = M o. */
  v1: Float64Array
  v2: Float64Array
  /** oᵀ M o of each, and their sum: χ² of a companion at the primary. */
  own: Float64Array
  constant: number
  /** 1 for a measure of two rows, 0 for a position angle alone. */
  isPair: Uint8Array
}

/** ρ nearest in time among the measures that have one; measures are sorted by epoch. */
function nearestRho(measures: readonly SkyMeasure[], index: number): number {
  for (let away = 0; away < measures.length; away++) {
    for (const i of [index - away, index + away]) {
      const rho = measures[i]?.rhoArcsec
      if (rho !== undefined && rho > 0) return rho
    }
  }
  return NaN
}

/**
 * Signs that put every ambiguous measure on the side of the one before it in time.
 * @param measures used measures, sorted by epoch.
 * @returns +1 or −1 a measure; +1 where the quadrant is stated or no angle was measured.
 */
export function chainedSigns(measures: readonly SkyMeasure[]): Int8Array {
  const signs = new Int8Array(measures.length).fill(1)
  let previous = NaN
  measures.forEach((measure, i) => {
    if (measure.form === 'rho') return
    if (measure.isAmbiguous && previous === previous && cos(measure.thetaRad - previous) < 0) signs[i] = -1
    previous = measure.thetaRad + (signs[i]! < 0 ? PI : 0)
  })
  return signs
}

/**
 * Prepares used measures for the search.
 * @param measures used measures, sorted by epoch, at least one with a separation.
 * @param signs +1, or −1 for a measure taken at θ + 180°.
 * @returns the points; measures of separation alone are left out.
 */
export function searchPoints(measures: readonly SkyMeasure[], signs: Int8Array): SearchPoints {
  const kept = measures.map((measure, i) => ({ measure, sign: signs[i]!, i })).filter(({ measure }) => measure.form !== 'rho')
  const array = () => new Float64Array(kept.length)
  const points: SearchPoints = {
    count: kept.length, epochsYr: array(), m11: array(), m12: array(), m22: array(), v1: array(), v2: array(), own: array(), constant: 0,
    isPair: Uint8Array.from(kept, ({ measure }) => (measure.form === 'theta' ? 0 : 1)),
  }
  kept.forEach(({ measure, sign, i }, at) => {
    const rho = measure.rhoArcsec > 0 ? measure.rhoArcsec : nearestRho(measures, i)
    const row = linearSkyRow(measure, rho)
    const m11 = row.w11 * row.w11 + row.w21 * row.w21
    const m12 = row.w11 * row.w12 + row.w21 * row.w22
    const m22 = row.w12 * row.w12 + row.w22 * row.w22
    const x = sign * (measure.form === 'theta' ? 0 : row.xo)
    const y = sign * (measure.form === 'theta' ? 0 : row.yo)
    points.epochsYr[at] = measure.epochYr
    points.m11[at] = m11
    points.m12[at] = m12
    points.m22[at] = m22
    points.v1[at] = m11 * x + m12 * y
    points.v2[at] = m12 * x + m22 * y
    points.own[at] = x * points.v1[at]! + y * points.v2[at]!
    points.constant += points.own[at]!
  })
  return points
}
