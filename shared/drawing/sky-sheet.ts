import type { FitResult, Prediction } from '../../fitting/types'
import { axisTicks } from './axis-ticks'
import { conicOutline, type Point } from './conic-outline'
import { frameAround, type DrawingFrame } from './drawing-frame'
import { scaleBar, type ScaleBar } from './scale-bar'
import { skyMeasures, skyNodes, skyPredictions } from './sky-geometry'
import { pathData } from './thumbnail-svg'

export const SKY_SHEET_PX = 560
const MARGIN_PX = 60
const EDGE_PX = 4
/** A letter of a label at its largest, on a phone, in the sheet's own pixels. */
const WIDEST_LETTER_PX = 9.6
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

export interface DrawnLabel {
  text: string
  at: Point
  anchor: 'start' | 'middle' | 'end'
}

/** The sky drawing of a pair, every length in pixels of a square sheet; north is up and east at the left. */
export interface SkySheet {
  gridX: number[]
  gridY: number[]
  /** Path of the fitted curve, null where there is none to draw. */
  curve: string | null
  focus: Point
  periastron: { at: Point; label: DrawnLabel } | null
  apsides: [Point, Point] | null
  nodes: [Point, Point] | null
  measures: DrawnMeasure[]
  predictions: { yearYr: number; at: Point; label: DrawnLabel }[]
  bar: ScaleBar
  pxPerArcsec: number
}

/**
 * Lays a fit out on its sheet.
 * @param result a finished fit of kind `relative`.
 * @param predictions places of coming years, in order; those that would crowd are left out.
 * @returns everything the drawing shows, in pixels.
 */
export function skySheet(result: FitResult, predictions: readonly Prediction[]): SkySheet {
  const outline = conicOutline(result)
  const measures = skyMeasures(result)
  const places = [...(outline?.points ?? []), ...measures.flatMap(({ observed }) => [observed]), { x: 0, y: 0 }]
  const frame = frameAround(places, { widthPx: SKY_SHEET_PX, heightPx: SKY_SHEET_PX, marginPx: MARGIN_PX, isEastLeft: true })
  const apsides = outline?.shape === 'closed' ? apsidesOf(outline.points) : null
  const nodes = skyNodes(result.elements)
  const focus = frame.toPx({ x: 0, y: 0 })
  return {
    ...gridOf(frame),
    curve: outline && pathData(outline, frame.toPx),
    focus,
    periastron: outline?.periapsis ? withLabel(frame.toPx(outline.periapsis), focus, 'periastron') : null,
    apsides: apsides && [frame.toPx(apsides[0]), frame.toPx(apsides[1])],
    nodes: nodes && [frame.toPx(nodes[0]), frame.toPx(nodes[1])],
    measures: measures.map(({ id, observed, computed, status }) => ({ id, status, at: frame.toPx(observed), computedAt: frame.toPx(computed) })),
    predictions: drawnPredictions(predictions, frame),
    bar: scaleBar(frame.pxPerUnit, LONGEST_BAR_PX),
    pxPerArcsec: frame.pxPerUnit,
  }
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

function drawnPredictions(predictions: readonly Prediction[], frame: DrawingFrame): SkySheet['predictions'] {
  const drawn: SkySheet['predictions'] = []
  const focus = frame.toPx({ x: 0, y: 0 })
  for (const { yearYr, place } of skyPredictions(predictions)) {
    const at = frame.toPx(place)
    if (drawn.some(other => Math.hypot(other.at.x - at.x, other.at.y - at.y) < LEAST_LABEL_DISTANCE_PX)) continue
    drawn.push({ yearYr, ...withLabel(at, focus, String(Math.round(yearYr * 100) / 100)) })
  }
  return drawn
}

/** A label on the side away from `inside`, kept on the paper. */
function withLabel(at: Point, inside: Point, text: string): { at: Point; label: DrawnLabel } {
  const away = Math.hypot(at.x - inside.x, at.y - inside.y) || 1
  const [dx, dy] = [(at.x - inside.x) / away, (at.y - inside.y) / away]
  const anchor = Math.abs(dx) < 0.35 ? 'middle' : dx > 0 ? 'start' : 'end'
  const widthPx = text.length * WIDEST_LETTER_PX
  const before = { start: 0, middle: widthPx / 2, end: widthPx }[anchor]
  const x = within(at.x + dx * 15, EDGE_PX + before, SKY_SHEET_PX - EDGE_PX - (widthPx - before))
  const y = within(at.y + dy * 20 + 4, 16, SKY_SHEET_PX - 8)
  return { at, label: { text, at: { x, y }, anchor } }
}

function within(value: number, least: number, greatest: number): number {
  return Math.min(greatest, Math.max(least, value))
}
