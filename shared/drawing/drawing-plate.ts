/** A point of a drawing in the target's own unit; x to the right, y upwards. */
export interface PlanePoint {
  x: number
  y: number
}

/** How the target's unit is laid onto a square sheet: equal scales, y turned downwards as SVG has it. */
export interface DrawingPlate {
  sizePx: number
  pxPerUnit: number
  /** The point at the sheet's middle. */
  middle: PlanePoint
}

/** A plate of `sizePx` square that holds all points inside a margin. */
export function plateAround(points: readonly PlanePoint[], sizePx: number, marginPx: number): DrawingPlate {
  const finite = points.filter(point => Number.isFinite(point.x) && Number.isFinite(point.y))
  if (finite.length === 0) return { sizePx, pxPerUnit: sizePx / 2, middle: { x: 0, y: 0 } }
  const xs = finite.map(point => point.x)
  const ys = finite.map(point => point.y)
  const [left, right] = [Math.min(...xs), Math.max(...xs)]
  const [low, high] = [Math.min(...ys), Math.max(...ys)]
  const span = Math.max(right - left, high - low) || Math.max(Math.abs(right), Math.abs(high), 1)
  return { sizePx, pxPerUnit: (sizePx - 2 * marginPx) / span, middle: { x: (left + right) / 2, y: (low + high) / 2 } }
}

/** A point in pixels of the plate, rounded to a tenth. */
export function onPlate(plate: DrawingPlate, point: PlanePoint): PlanePoint {
  return {
    x: tenth(plate.sizePx / 2 + (point.x - plate.middle.x) * plate.pxPerUnit),
    y: tenth(plate.sizePx / 2 - (point.y - plate.middle.y) * plate.pxPerUnit),
  }
}

/** An SVG path through points already in pixels. */
export function pathThrough(points: readonly PlanePoint[], isClosed: boolean): string {
  if (points.length === 0) return ''
  const steps = points.map((point, index) => `${index === 0 ? 'M' : 'L'}${tenth(point.x)} ${tenth(point.y)}`)
  return steps.join('') + (isClosed ? 'Z' : '')
}

/** The least and greatest value of the drawing's unit that the plate shows, along x and y. */
export function plateBounds(plate: DrawingPlate): { left: number; right: number; low: number; high: number } {
  const half = plate.sizePx / 2 / plate.pxPerUnit
  return { left: plate.middle.x - half, right: plate.middle.x + half, low: plate.middle.y - half, high: plate.middle.y + half }
}

function tenth(px: number): number {
  return Math.round(px * 10) / 10
}
