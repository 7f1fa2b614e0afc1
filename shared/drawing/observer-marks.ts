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

const OUTLINES: Record<MarkShape, (half: number) => string> = {
  circle: half => `M${-half} 0a${half} ${half} 0 1 0 ${2 * half} 0a${half} ${half} 0 1 0 ${-2 * half} 0Z`,
  square: half => box(half * 0.88),
  triangle: half => `M0 ${-1.22 * half}L${1.16 * half} ${0.84 * half}H${-1.16 * half}Z`,
  diamond: half => `M0 ${-1.32 * half}L${1.2 * half} 0L0 ${1.32 * half}L${-1.2 * half} 0Z`,
  cross: half => `M${-half} ${-half}L${half} ${half}M${-half} ${half}L${half} ${-half}`,
  'turned-triangle': half => `M0 ${1.22 * half}L${1.16 * half} ${-0.84 * half}H${-1.16 * half}Z`,
  plus: half => `M${-1.2 * half} 0H${1.2 * half}M0 ${-1.2 * half}V${1.2 * half}`,
  star: half => `M${-1.2 * half} 0H${1.2 * half}M${-0.65 * half} ${-1.1 * half}L${0.65 * half} ${1.1 * half}M${0.65 * half} ${-1.1 * half}L${-0.65 * half} ${1.1 * half}`,
}

function box(half: number): string {
  return `M${-half} ${-half}H${half}V${half}H${-half}Z`
}

/** Outline of a mark about (0, 0), as an SVG path with `halfPx` pixels from its middle to its edge. */
export function markPath(shape: MarkShape, halfPx: number): string {
  return OUTLINES[shape](halfPx).replace(/-?\d+\.\d{3,}/g, number => String(Math.round(Number(number) * 100) / 100))
}

/** Shapes that are filled; the others are outlines, so that marks on top of each other stay readable. */
export function isFilledShape(shape: MarkShape): boolean {
  return shape === 'circle' || shape === 'triangle'
}
