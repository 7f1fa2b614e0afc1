import type { FitResult, Prediction } from '../../fitting/types'
import { formatJulianDay } from '../units/date-text'
import type { Point } from './conic-outline'
import { frameAround } from './drawing-frame'
import { emptiestBox, labelPoints, placeLabel, type DrawnLabel } from './label-place'
import { graticule, type Graticule } from './sky-graticule'
import { middleOf, skyProjection, type SkyDirection } from './sky-projection'
import { SKY_SHEET_PX, type DrawnMeasure } from './sky-sheet'
import type { TrackSpan } from './track-dates'

const MARGIN_PX = 60
const LEAST_LABEL_DISTANCE_PX = 30

/** The path of a body over the sky in pixels of a square sheet: north up, right ascension growing to the left. */
export interface TrackSheet extends Graticule {
  /** Path over the measured arc, and on from the last measure. */
  measured: string
  coming: string
  dates: { at: Point; label: DrawnLabel; isComing: boolean }[]
  measures: DrawnMeasure[]
  /** Where the arrows to north and east meet. */
  compassAt: Point
}

interface Track {
  result: FitResult
  span: TrackSpan
  /** Predictions along the span. */
  path: readonly Prediction[]
  /** Predictions at the dates to be marked. */
  marked: readonly Prediction[]
}

/** Lays the path out on its sheet; null where there is no path to draw. */
export function trackSheet({ result, span, path, marked }: Track): TrackSheet | null {
  const along = path.flatMap(placeOf)
  const middle = middleOf(along.map(one => one.direction))
  if (along.length < 2 || !middle) return null
  const project = skyProjection(middle)
  const seen = trackMeasures(result)
  const places = [...along, ...seen.map(({ observed }) => ({ direction: observed }))].map(({ direction }) => project(direction))
  const frame = frameAround(places, { widthPx: SKY_SHEET_PX, heightPx: SKY_SHEET_PX, marginPx: MARGIN_PX, isEastLeft: true })
  const toPx = (direction: SkyDirection) => frame.toPx(project(direction))
  const obstacles = [...along.map(one => toPx(one.direction)), ...seen.map(measure => toPx(measure.observed))]
  const line = (isWithin: (jd: number) => boolean) => pathOf(along.filter(one => isWithin(one.jd)).map(one => toPx(one.direction)))
  return {
    measured: line(jd => jd <= span.lastMeasureJd),
    coming: line(jd => jd >= span.lastMeasureJd),
    compassAt: freeCorner(obstacles),
    dates: datesOf(marked.flatMap(placeOf).map(({ jd, direction }) => ({ jd, at: toPx(direction) })), obstacles, span),
    measures: seen.map(({ id, status, observed, computed }) => ({ id, status, at: toPx(observed), computedAt: toPx(computed) })),
    ...graticule({ middle, toPx, fieldDeg: SKY_SHEET_PX / frame.pxPerUnit, sizePx: SKY_SHEET_PX }),
  }
}

function placeOf({ at, values }: Prediction): { jd: number; direction: SkyDirection }[] {
  const { raDeg, decDeg } = values
  return raDeg === undefined || decDeg === undefined ? [] : [{ jd: at, direction: { raDeg, decDeg } }]
}

/** A measure of a moving body, as seen and as the fit puts it; the table of the drawing's numbers is written from these. */
export interface TrackMeasure {
  id: string
  observed: SkyDirection
  computed: SkyDirection
  status: DrawnMeasure['status']
}

export function trackMeasures(result: FitResult): TrackMeasure[] {
  return result.residuals.flatMap(({ id, status, computed, observedMinusComputed }) => {
    const { raDeg, decDeg } = computed
    const { raCosDecArcsec, decArcsec } = observedMinusComputed
    if (raDeg === undefined || decDeg === undefined) return []
    const observed = {
      raDeg: raDeg + (raCosDecArcsec ?? 0) / 3600 / Math.max(1e-6, Math.cos((decDeg * Math.PI) / 180)),
      decDeg: decDeg + (decArcsec ?? 0) / 3600,
    }
    return [{ id, status, observed, computed: { raDeg, decDeg } }]
  })
}

/** The compass takes the emptier upper corner. */
function freeCorner(obstacles: readonly Point[]): Point {
  const far = SKY_SHEET_PX
  const isAtLeft = emptiestBox([{ left: far - 130, right: far, top: 0, bottom: 120 }, { left: 0, right: 150, top: 0, bottom: 120 }], obstacles) === 1
  return { x: isAtLeft ? 116 : far - 32, y: 66 }
}

function datesOf(places: readonly { jd: number; at: Point }[], path: readonly Point[], { lastMeasureJd }: TrackSpan): TrackSheet['dates'] {
  const taken = [...path]
  const inside = { x: SKY_SHEET_PX / 2, y: SKY_SHEET_PX / 2 }
  const drawn: TrackSheet['dates'] = []
  for (const { jd, at } of places) {
    if (drawn.some(other => Math.hypot(other.at.x - at.x, other.at.y - at.y) < LEAST_LABEL_DISTANCE_PX)) continue
    const label = placeLabel(at, inside, [formatJulianDay(jd)], { sizePx: SKY_SHEET_PX, obstacles: taken })
    taken.push(...labelPoints(label))
    drawn.push({ at, label, isComing: jd > lastMeasureJd })
  }
  return drawn
}

function pathOf(points: readonly Point[]): string {
  return points.length < 2 ? '' : `M${points.map(({ x, y }) => `${tenth(x)} ${tenth(y)}`).join('L')}`
}

function tenth(px: number): number {
  return Math.round(px * 10) / 10
}
