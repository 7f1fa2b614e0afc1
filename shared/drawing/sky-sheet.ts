import type { FitResult, Prediction } from '../../fitting/types'
import { formatEpoch } from '../units/angles'
import { axisTicks } from './axis-ticks'
import { conicOutline, type Point } from './conic-outline'
import { frameAround, type DrawingFrame } from './drawing-frame'
import { emptiestBox, labelPoints, placeLabel, type DrawnLabel } from './label-place'
import { scaleBar, type ScaleBar } from './scale-bar'
import { skyMeasures, skyNodes, skyPredictions } from './sky-geometry'
import { pathData } from './thumbnail-svg'

export const SKY_SHEET_PX = 560
const MARGIN_PX = 60
const EDGE_PX = 12
const LONGEST_BAR_PX = 190
/** Predictions closer together on paper than this would print their years over each other. */
const LEAST_LABEL_DISTANCE_PX = 34

/** A measure on paper: where it was seen, and the end of its tick at the computed place. */
export interface DrawnMeasure {
  id: string
  at: Point
  computedAt: Point
  status: 'used' | 'set-aside' | 'not-fitted'
}

interface Labelled {
  at: Point
  label: DrawnLabel
}

/** The sky drawing of a pair, every length in pixels of a square sheet; north is up and east at the left. */
export interface SkySheet {
  gridX: number[]
  gridY: number[]
  /** Path of the fitted curve, null where there is none to draw. */
  curve: string | null
  focus: Point
  periastron: Labelled | null
  apsides: [Point, Point] | null
  nodes: [Point, Point] | null
  measures: DrawnMeasure[]
  predictions: (Labelled & { yearYr: number })[]
  bar: ScaleBar & { at: Point }
  /** Where the arrows to north and east meet. */
  compassAt: Point
}

/**
 * Lays a fit out on its sheet.
 * @param result a finished fit of kind `relative`.
 * @param predictions places of coming years, in order; those that would crowd are left out.
 * @returns everything the drawing shows, in pixels.
 */
export function skySheet(result: FitResult, predictions: readonly Prediction[]): SkySheet {
  const outline = conicOutline(result)
  const seen = skyMeasures(result)
  const places = [...(outline?.points ?? []), ...seen.map(measure => measure.observed), { x: 0, y: 0 }]
  const frame = frameAround(places, { widthPx: SKY_SHEET_PX, heightPx: SKY_SHEET_PX, marginPx: MARGIN_PX, isEastLeft: true })
  const focus = frame.toPx({ x: 0, y: 0 })
  const obstacles = places.map(frame.toPx)
  const labelled = labelsOf({ frame, focus, obstacles }, predictions, outline?.periapsis ?? null, result)
  const apsides = outline?.shape === 'closed' ? apsidesOf(outline.points) : null
  const nodes = skyNodes(result.elements)
  const corner = freeCorners(obstacles)
  return {
    ...gridOf(frame), ...labelled, focus,
    curve: outline && pathData(outline.shape === 'straight' ? { ...outline, points: reachingTo(outline.points, predictions, frame) } : outline, frame.toPx),
    apsides: apsides && [frame.toPx(apsides[0]), frame.toPx(apsides[1])],
    nodes: nodes && [frame.toPx(nodes[0]), frame.toPx(nodes[1])],
    measures: seen.map(({ id, observed, computed, status }) => ({ id, status, at: frame.toPx(observed), computedAt: frame.toPx(computed) })),
    compassAt: corner.compassAt,
    bar: barAt(scaleBar(frame.pxPerUnit, LONGEST_BAR_PX), corner.isBarAtRight),
  }
}

/** A straight line is drawn on to the last prediction that lies on the paper. */
function reachingTo(points: readonly Point[], predictions: readonly Prediction[], frame: DrawingFrame): Point[] {
  const [begin, end] = [points[0], points[points.length - 1]]
  if (!begin || !end) return [...points]
  const along = ({ x, y }: Point) => (x - begin.x) * (end.x - begin.x) + (y - begin.y) * (end.y - begin.y)
  const ahead = skyPredictions(predictions).map(({ place }) => place).filter(place => isOnPaper(frame.toPx(place)))
  const sorted = [begin, end, ...ahead].sort((a, b) => along(a) - along(b))
  return [sorted[0] ?? begin, sorted[sorted.length - 1] ?? end]
}

/** The outline runs once around from periastron in even steps of the eccentric anomaly: apastron lies half-way. */
function apsidesOf(points: readonly Point[]): [Point, Point] | null {
  const [periastron, apastron] = [points[0], points[points.length / 2]]
  return periastron && apastron ? [periastron, apastron] : null
}

function gridOf(frame: DrawingFrame): { gridX: number[]; gridY: number[] } {
  const origin = frame.toPx({ x: 0, y: 0 })
  const inUnits = (px: number, zeroPx: number) => (px - zeroPx) / frame.pxPerUnit
  const onPaper = (zeroPx: number) =>
    axisTicks(inUnits(0, zeroPx), inUnits(SKY_SHEET_PX, zeroPx), 8).values.map(value => zeroPx + value * frame.pxPerUnit)
  return { gridX: onPaper(origin.x), gridY: onPaper(origin.y) }
}

interface Paper {
  frame: DrawingFrame
  focus: Point
  obstacles: Point[]
}

/** Years first, then periastron; each keeps clear of those before it. */
function labelsOf({ frame, focus, obstacles }: Paper, predictions: readonly Prediction[], periapsis: Point | null, result: FitResult): Pick<SkySheet, 'periastron' | 'predictions'> {
  const taken = [...obstacles]
  const withLabel = (at: Point, lines: string[]): Labelled => {
    const label = placeLabel(at, focus, lines, { sizePx: SKY_SHEET_PX, obstacles: taken })
    taken.push(...labelPoints(label))
    return { at, label }
  }
  const drawn: SkySheet['predictions'] = []
  for (const { yearYr, place } of skyPredictions(predictions)) {
    const at = frame.toPx(place)
    if (!isOnPaper(at) || drawn.some(other => Math.hypot(other.at.x - at.x, other.at.y - at.y) < LEAST_LABEL_DISTANCE_PX)) continue
    drawn.push({ yearYr, ...withLabel(at, [String(Math.round(yearYr * 100) / 100)]) })
  }
  const periastron = periapsis && withLabel(frame.toPx(periapsis), ['periastron', formatEpoch(result.elements.periastronTime?.value ?? null, 2)])
  return { predictions: drawn, periastron }
}

function isOnPaper({ x, y }: Point): boolean {
  return Math.min(x, y) > EDGE_PX && Math.max(x, y) < SKY_SHEET_PX - EDGE_PX
}

/** The compass takes the emptier upper corner, the scale bar the emptier lower one. */
function freeCorners(obstacles: readonly Point[]): { compassAt: Point; isBarAtRight: boolean } {
  const far = SKY_SHEET_PX
  const isCompassAtLeft = emptiestBox([{ left: far - 110, right: far, top: 0, bottom: 100 }, { left: 0, right: 130, top: 0, bottom: 100 }], obstacles) === 1
  const isBarAtRight = emptiestBox([{ left: 0, right: 230, top: far - 60, bottom: far }, { left: far - 230, right: far, top: far - 60, bottom: far }], obstacles) === 1
  return { compassAt: { x: isCompassAtLeft ? 92 : far - 32, y: 78 }, isBarAtRight }
}

function barAt(bar: ScaleBar, isAtRight: boolean): SkySheet['bar'] {
  return { ...bar, at: { x: isAtRight ? SKY_SHEET_PX - 24 - bar.lengthPx : 24, y: 534 } }
}
