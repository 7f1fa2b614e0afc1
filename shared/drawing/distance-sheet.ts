import { axisTicks } from './axis-ticks'
import type { Prediction } from '../../fitting/types'
import { formatJulianDay } from '../units/date-text'
import { markedDays, type TrackSpan } from './track-dates'

export const DISTANCE_SHEET = { widthPx: 560, heightPx: 190, left: 50, right: 86, top: 12, bottom: 26 } as const
const LABEL_GAP_PX = 16

interface DrawnCurve {
  path: string
  label: { text: string; y: number }
}

/** Distances from the Earth and from the Sun over time, in pixels. */
export interface DistanceSheet {
  fromEarth: DrawnCurve
  fromSun: DrawnCurve
  dateTicks: { px: number; text: string }[]
  distanceTicks: { px: number; value: number; decimals: number }[]
  lastMeasurePx: number
  /** Below zero: no distance is. */
  bottomPx: number
}

/** Lays the distances out over the span; null where fewer than two predictions have them. */
export function distanceSheet(path: readonly Prediction[], { fromJd, lastMeasureJd, toJd }: TrackSpan): DistanceSheet | null {
  const points = path.flatMap(({ at, values: { distanceAu, sunDistanceAu } }) => (distanceAu === undefined || sunDistanceAu === undefined ? [] : [{ at, distanceAu, sunDistanceAu }]))
  if (points.length < 2) return null
  const { widthPx, heightPx, left, right, top, bottom } = DISTANCE_SHEET
  const all = points.flatMap(point => [point.distanceAu, point.sunDistanceAu])
  const room = (Math.max(...all) - Math.min(...all)) * 0.08 || 0.05
  const [low, high] = [Math.max(0, Math.min(...all) - room), Math.max(...all) + room]
  const x = (jd: number) => tenth(left + ((jd - fromJd) / (toJd - fromJd)) * (widthPx - left - right))
  const y = (au: number) => tenth(heightPx - bottom - ((au - low) / (high - low)) * (heightPx - top - bottom))
  const ticks = axisTicks(low, high, 7)
  const curve = (pick: (point: (typeof points)[number]) => number) => `M${points.map(point => `${x(point.at)} ${y(pick(point))}`).join('L')}`
  const last = points[points.length - 1]!
  const [earthY, sunY] = apart(y(last.distanceAu), y(last.sunDistanceAu))
  return {
    fromEarth: { path: curve(point => point.distanceAu), label: { text: 'Earth', y: earthY } },
    fromSun: { path: curve(point => point.sunDistanceAu), label: { text: 'Sun', y: sunY } },
    dateTicks: markedDays(fromJd, toJd, 6).map(jd => ({ px: x(jd), text: formatJulianDay(jd) })),
    distanceTicks: ticks.values.map(value => ({ value, decimals: ticks.decimals, px: y(value) })),
    lastMeasurePx: x(lastMeasureJd),
    bottomPx: heightPx - bottom,
  }
}

/** Two labels that would stand over each other are moved apart. */
function apart(first: number, second: number): [number, number] {
  const missing = (LABEL_GAP_PX - Math.abs(first - second)) / 2
  if (missing <= 0) return [first + 4, second + 4]
  const sign = first < second ? -1 : 1
  return [first + sign * missing + 4, second - sign * missing + 4]
}

function tenth(px: number): number {
  return Math.round(px * 10) / 10
}
