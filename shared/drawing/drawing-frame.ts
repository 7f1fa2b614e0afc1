import type { Point } from './conic-outline'

/** How places are put on paper: one scale in both directions, so that angles stay true. */
export interface DrawingFrame {
  widthPx: number
  heightPx: number
  /** Pixels for one unit of the places. */
  pxPerUnit: number
  /** Place → pixel, y downward as SVG has it. */
  toPx: (point: Point) => Point
}

export interface FrameOptions {
  widthPx: number
  heightPx: number
  marginPx: number
  /** As one looks at the sky, north up: east is at the left. */
  isEastLeft: boolean
}

/**
 * Finds the largest scale at which all places fit inside the margins, centred.
 * @param places at least one place, finite; a focus that is to be seen belongs among them.
 * @param options size of the paper in pixels and the handedness of the drawing.
 * @returns the frame; where all places coincide the scale is one that keeps them in the middle.
 */
export function frameAround(places: readonly Point[], options: FrameOptions): DrawingFrame {
  const sign = options.isEastLeft ? -1 : 1
  const xs = places.map(place => sign * place.x)
  const ys = places.map(place => place.y)
  const [left, right] = [least(xs), largest(xs)]
  const [bottom, top] = [least(ys), largest(ys)]
  const roomX = (options.widthPx - 2 * options.marginPx) / (right - left)
  const roomY = (options.heightPx - 2 * options.marginPx) / (top - bottom)
  const scale = Math.min(roomX, roomY)
  const pxPerUnit = Number.isFinite(scale) ? scale : 1
  const middle = { x: (left + right) / 2, y: (bottom + top) / 2 }
  return {
    widthPx: options.widthPx,
    heightPx: options.heightPx,
    pxPerUnit,
    toPx: ({ x, y }) => ({
      x: options.widthPx / 2 + pxPerUnit * (sign * x - middle.x),
      y: options.heightPx / 2 - pxPerUnit * (y - middle.y),
    }),
  }
}

// Math.min(...values) overflows the stack on very long lists.
function least(values: readonly number[]): number {
  return values.reduce((low, value) => Math.min(low, value), Infinity)
}

function largest(values: readonly number[]): number {
  return values.reduce((high, value) => Math.max(high, value), -Infinity)
}
