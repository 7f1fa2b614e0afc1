/**
 * Normal points: measures close in time brought to one, about a provisional orbit.
 *   mean O−C = (Σ Mᵢ)⁻¹ Σ Mᵢ (O−C)ᵢ,  Mᵢ the 2 × 2 information of a measure in (north, east);
 *   epoch Σ tr Mᵢ tᵢ / Σ tr Mᵢ; place: the orbit there plus the mean; covariance (Σ Mᵢ)⁻¹
 * At most P/50 from first to last member. Position angles or separations alone and ambiguous quadrants stay by themselves.
 * Source: common practice; Heintz 1978, Double Stars.
 */
import { atan2, hypot } from '../elementary'
import type { SkyMeasure, SkyMeasures } from '../models/sky-measure'
import type { SkyPath } from '../models/sky-path'
import { skyRow } from '../models/sky-rows'
import type { NormalPoint } from '../types'

const PARTS_OF_PERIOD = 50

interface Orbit {
  path: SkyPath
  values: ArrayLike<number>
  periodYr: number
}

function isPlace({ form, isAmbiguous }: SkyMeasure): boolean {
  return form === 'rectangular' || (form === 'polar' && !isAmbiguous)
}

/** Groups of places in order of time, none longer than the longest; everything else alone. */
function groupsOf(used: readonly SkyMeasure[], longestYr: number): SkyMeasure[][] {
  const groups: SkyMeasure[][] = []
  let open: SkyMeasure[] | null = null
  for (const measure of used) {
    if (!isPlace(measure)) groups.push([measure])
    else if (open !== null && measure.epochYr - open[0]!.epochYr <= longestYr) open.push(measure)
    else groups.push((open = [measure]))
  }
  return groups
}

function placeAt({ path, values }: Orbit, epochYr: number): { x: number; y: number } {
  const position = new Float64Array(2 + 2 * path.parameters)
  path.prepare(values)
  path.at(epochYr, position, false)
  return { x: position[0]!, y: position[1]! }
}

/** One member's information and its O−C in north and east. */
function memberOf(orbit: Orbit, measure: SkyMeasure) {
  const { x, y } = placeAt(orbit, measure.epochYr)
  const row = skyRow({ ...measure, sigmaThetaRad: Math.min(measure.sigmaThetaRad, LARGEST_LINEAR_RAD) }, hypot(x, y))
  const m11 = row.w11 * row.w11 + row.w21 * row.w21
  const m12 = row.w11 * row.w12 + row.w21 * row.w22
  const m22 = row.w12 * row.w12 + row.w22 * row.w22
  return { m11, m12, m22, dx: row.xo - x, dy: row.yo - y }
}

/** Below 5°, so that the row is one of a place. */
const LARGEST_LINEAR_RAD = 0.087

function pointOf(orbit: Orbit, members: readonly SkyMeasure[]): SkyMeasure {
  const sum = { m11: 0, m12: 0, m22: 0, v1: 0, v2: 0, weight: 0, moment: 0 }
  const first = members[0]!
  for (const measure of members) {
    const { m11, m12, m22, dx, dy } = memberOf(orbit, measure)
    sum.m11 += m11
    sum.m12 += m12
    sum.m22 += m22
    sum.v1 += m11 * dx + m12 * dy
    sum.v2 += m12 * dx + m22 * dy
    sum.weight += m11 + m22
    sum.moment += (m11 + m22) * (measure.epochYr - first.epochYr)
  }
  const determinant = sum.m11 * sum.m22 - sum.m12 * sum.m12
  const epochYr = first.epochYr + sum.moment / sum.weight
  const place = placeAt(orbit, epochYr)
  const north = place.x + (sum.m22 * sum.v1 - sum.m12 * sum.v2) / determinant
  const east = place.y + (sum.m11 * sum.v2 - sum.m12 * sum.v1) / determinant
  return {
    ...first, id: members.map((measure) => measure.id).join(' + '), epochYr, form: 'rectangular', isAmbiguous: false, north, east,
    thetaRad: atan2(east, north), rhoArcsec: hypot(north, east), sigmaAlong: NaN, sigmaThetaRad: NaN,
    sigmaNorth: Math.sqrt(sum.m22 / determinant), sigmaEast: Math.sqrt(sum.m11 / determinant),
    correlation: -sum.m12 / Math.sqrt(sum.m11 * sum.m22), weight: 1, robustWeight: 1,
  }
}

/**
 * Brings measures close in time to normal points.
 * @param measures with their errors; their own list stays as it is.
 * @param orbit provisional: path, its parameters, and the period, yr.
 * @returns the measures with points in the place of the used ones, and the points of two or more members.
 * Source: common practice; Heintz 1978, Double Stars.
 */
export function withNormalPoints(measures: SkyMeasures, orbit: Orbit): { measures: SkyMeasures; points: NormalPoint[] } {
  const own = measures.all.filter((measure) => measure.status === 'used')
  const groups = groupsOf(own, orbit.periodYr / PARTS_OF_PERIOD)
  const points: NormalPoint[] = []
  const used = groups.map((members) => {
    if (members.length === 1) return members[0]!
    const point = pointOf(orbit, members)
    points.push({
      epochYr: point.epochYr, northArcsec: point.north, eastArcsec: point.east, sigmaNorthArcsec: point.sigmaNorth, sigmaEastArcsec: point.sigmaEast,
      correlation: point.correlation, members: members.map((measure) => measure.id),
    })
    return point
  }).sort((a, b) => a.epochYr - b.epochYr)
  return { measures: { ...measures, used }, points }
}
