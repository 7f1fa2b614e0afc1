export const MARK_SHAPES = ['circle', 'square', 'triangle', 'diamond', 'cross', 'turned-triangle', 'plus', 'star'] as const
export type MarkShape = (typeof MARK_SHAPES)[number]

/** How an observer's measures are told apart: by shape first, by hue besides. */
export interface ObserverMark {
  observer: string
  measures: number
  shape: MarkShape
  /** 0 to 4: the CSS variables --o0 to --o4. */
  hue: number
}

export const HUES = 5

/** Marks by observer, in order of the name; shape and hue both step, so that 40 observers differ. */
export function observerMarks(observers: readonly string[]): ObserverMark[] {
  const counts = new Map<string, number>()
  for (const observer of observers) counts.set(observer, (counts.get(observer) ?? 0) + 1)
  const byName = [...counts].sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
  return byName.map(([observer, measures], index) => ({
    observer, measures, shape: MARK_SHAPES[index % MARK_SHAPES.length] as MarkShape, hue: index % HUES,
  }))
}

/** Outlines as relative path commands that begin at the mark's middle; h is the half-size in pixels. */
const OUTLINES: Record<MarkShape, (h: number) => (string | number)[]> = {
  circle: h => ['m', -h, 0, 'a', h, h, 0, 1, 0, 2 * h, 0, 'a', h, h, 0, 1, 0, -2 * h, 0, 'z'],
  square: h => ['m', -0.88 * h, -0.88 * h, 'h', 1.76 * h, 'v', 1.76 * h, 'h', -1.76 * h, 'z'],
  triangle: h => ['m', 0, -1.22 * h, 'l', 1.16 * h, 2.06 * h, 'h', -2.32 * h, 'z'],
  diamond: h => ['m', 0, -1.32 * h, 'l', 1.2 * h, 1.32 * h, 'l', -1.2 * h, 1.32 * h, 'l', -1.2 * h, -1.32 * h, 'z'],
  cross: h => ['m', -h, -h, 'l', 2 * h, 2 * h, 'm', -2 * h, 0, 'l', 2 * h, -2 * h],
  'turned-triangle': h => ['m', 0, 1.22 * h, 'l', 1.16 * h, -2.06 * h, 'h', -2.32 * h, 'z'],
  plus: h => ['m', -1.2 * h, 0, 'h', 2.4 * h, 'm', -1.2 * h, -1.2 * h, 'v', 2.4 * h],
  star: h => ['m', -1.2 * h, 0, 'h', 2.4 * h, 'm', -1.85 * h, -1.1 * h, 'l', 1.3 * h, 2.2 * h, 'm', 0, -2.2 * h, 'l', -1.3 * h, 2.2 * h],
}

/** Outline of a mark about a point (the origin where none is given), as an SVG path with `halfPx` pixels from its middle to its edge. */
export function markPath(shape: MarkShape, halfPx: number, x = 0, y = 0): string {
  return `M${x} ${y}${outlineOf(shape, halfPx)}`
}

/** A page draws hundreds of marks of few shapes and sizes. */
const written = new Map<string, string>()

function outlineOf(shape: MarkShape, halfPx: number): string {
  const key = `${shape} ${halfPx}`
  const known = written.get(key)
  if (known !== undefined) return known
  const commands = OUTLINES[shape](halfPx).map(part => (typeof part === 'number' ? Math.round(part * 100) / 100 : part))
  const outline = commands.join(' ').replaceAll(/ ?([a-z]) ?/g, '$1')
  written.set(key, outline)
  return outline
}

/** Shapes that are filled; the others are outlines, so that marks on top of each other stay readable. */
export function isFilledShape(shape: MarkShape): boolean {
  return shape === 'circle' || shape === 'triangle'
}
