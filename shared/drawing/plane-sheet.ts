import type { FitResult } from '../../fitting/types'
import { axisTicks } from './axis-ticks'
import { conicOutline, type Point } from './conic-outline'
import { frameAround } from './drawing-frame'
import { carriedBackMeasures, conicRadius, planeConic, planeMeasures, radiusByAnomaly, reachOf } from './orbit-plane-geometry'
import { scaleBar, type ScaleBar } from './scale-bar'
import { SKY_SHEET_PX, type DrawnMeasure } from './sky-sheet'
import { pathData } from './thumbnail-svg'

const MARGIN_PX = 60
const LONGEST_BAR_PX = 190

/** The conic in its own plane, in pixels of a square sheet: φ = 0 to the right, φ growing counter-clockwise. */
export interface PlaneSheet {
  curve: string | null
  focus: Point
  periapsis: Point | null
  /** The line from the far apsis (or the focus, for an open conic) through the focus to periapsis. */
  apsides: [Point, Point] | null
  /** From the focus toward φ = 0, to the margin. */
  zeroDirection: [Point, Point]
  /** Spokes every 30° to the margin, faint. */
  spokes: [Point, Point][]
  measures: DrawnMeasure[]
  bar: ScaleBar
}

/** Lays a fit of kind `plane` out on its sheet. */
export function planeSheet(result: FitResult): PlaneSheet {
  const outline = conicOutline(result)
  const measures = planeMeasures(result)
  const places = [...(outline?.points ?? []), ...measures.map(measure => measure.observed), { x: 0, y: 0 }]
  const frame = frameAround(places, { widthPx: SKY_SHEET_PX, heightPx: SKY_SHEET_PX, marginPx: MARGIN_PX, isEastLeft: false })
  const reach = places.reduce((greatest, place) => Math.max(greatest, Math.hypot(place.x, place.y)), 0)
  const toward = (phiRad: number, length: number) => frame.toPx({ x: length * Math.cos(phiRad), y: length * Math.sin(phiRad) })
  const focus = frame.toPx({ x: 0, y: 0 })
  const far = outline?.shape === 'closed' ? outline.points[outline.points.length / 2] : { x: 0, y: 0 }
  return {
    curve: outline && pathData(outline, frame.toPx),
    focus,
    periapsis: outline?.periapsis ? frame.toPx(outline.periapsis) : null,
    apsides: outline?.periapsis && far ? [frame.toPx(outline.periapsis), frame.toPx(far)] : null,
    zeroDirection: [focus, toward(0, reach * 1.06)],
    spokes: Array.from({ length: 12 }, (_, index) => [focus, toward((index * Math.PI) / 6, reach * 2)]),
    measures: measures.map(({ id, status, observed, computed }) => ({ id, status, at: frame.toPx(observed), computedAt: frame.toPx(computed) })),
    bar: scaleBar(frame.pxPerUnit, LONGEST_BAR_PX),
  }
}

export const RADIUS_SHEET = { widthPx: 560, heightPx: 190, left: 50, right: 14, top: 12, bottom: 26 } as const

/** r against φ in the plane of the orbit, φ from periapsis. */
export interface RadiusSheet {
  curve: string
  anomalyTicks: { px: number; deg: number }[]
  radiusTicks: { px: number; value: number; decimals: number }[]
  measures: { id: string; at: Point; status: DrawnMeasure['status'] }[]
  /** p stands where φ = ±90°: the dashed chord between. */
  chord: { left: number; right: number; y: number } | null
}

/** Lays r(φ) = p / (1 + e cos φ) out with the measures carried back; null where the fit has no conic. */
export function radiusSheet(result: FitResult): RadiusSheet | null {
  const conic = planeConic(result)
  if (!conic) return null
  const measures = carriedBackMeasures(result)
  const used = measures.filter(measure => measure.status === 'used').map(measure => measure.radius)
  const curve = radiusByAnomaly(conic, reachOf(conic, used))
  const radii = [...curve.map(point => point.radius), ...used]
  const [low, high] = padded(Math.min(...radii), Math.max(...radii))
  const { widthPx, heightPx, left, right, top, bottom } = RADIUS_SHEET
  const x = (deg: number) => left + ((deg + 180) / 360) * (widthPx - left - right)
  const y = (radius: number) => heightPx - bottom - ((radius - low) / (high - low)) * (heightPx - top - bottom)
  const within = (radius: number) => Math.min(high, Math.max(low, radius))
  const ticks = axisTicks(low, high, 5)
  return {
    curve: curve.map((point, index) => `${index ? 'L' : 'M'}${tenth(x(point.trueAnomalyDeg))} ${tenth(y(point.radius))}`).join(''),
    anomalyTicks: [-180, -90, 0, 90, 180].map(deg => ({ deg, px: x(deg) })),
    radiusTicks: ticks.values.map(value => ({ value, decimals: ticks.decimals, px: tenth(y(value)) })),
    measures: measures.map(({ id, status, trueAnomalyDeg, radius }) => ({ id, status, at: { x: tenth(x(trueAnomalyDeg)), y: tenth(y(within(radius))) } })),
    chord: conicRadius(conic, 90) <= high ? { left: x(-90), right: x(90), y: tenth(y(conic.semiLatusRectum)) } : null,
  }
}

function padded(low: number, high: number): [number, number] {
  const room = (high - low) * 0.07 || Math.abs(high) * 0.07 || 1
  return [low - room, high + room]
}

function tenth(px: number): number {
  return Math.round(px * 10) / 10
}
