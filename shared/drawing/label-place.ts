import type { Point } from './conic-outline'

/** A label's place on a square sheet: the baseline of its first line; the anchor is SVG's text-anchor. */
export interface DrawnLabel {
  lines: string[]
  at: Point
  anchor: 'start' | 'middle' | 'end'
}

interface Box {
  left: number
  right: number
  top: number
  bottom: number
}

interface Paper {
  sizePx: number
  /** What a label should not be printed over: points of the curve, marks, earlier labels. */
  obstacles: readonly Point[]
}

const GAP_PX = 11
export const LINE_PX = 15
const EDGE_PX = 4
/** A letter at its usual size, and at its largest (on a phone, in the sheet's own pixels). */
const LETTER_PX = 7.2
const WIDEST_LETTER_PX = 9.6
const OFF_PAPER_COST = 1000
const INWARD_COST = 3

/**
 * Finds a free place for a label beside a point.
 * @param at the point, px.
 * @param inside toward where labels should rather not lie, px.
 * @param lines of the label, one or more.
 * @param paper its size and what stands on it.
 * @returns the candidate that covers least; of equal ones the one away from `inside`.
 */
export function placeLabel(at: Point, inside: Point, lines: string[], paper: Paper): DrawnLabel {
  const candidates = aroundPoint(at, lines).map(label => ({ label, cost: costOf(label, at, inside, paper) }))
  return candidates.reduce((best, one) => (one.cost < best.cost ? one : best)).label
}

function aroundPoint({ x, y }: Point, lines: string[]): DrawnLabel[] {
  const near = GAP_PX * 0.8
  const more = (lines.length - 1) * LINE_PX
  const candidate = (anchor: DrawnLabel['anchor'], atX: number, atY: number): DrawnLabel => ({ lines, anchor, at: { x: atX, y: atY } })
  return [
    candidate('end', x - GAP_PX, y + 4 - more / 2),
    candidate('start', x + GAP_PX, y + 4 - more / 2),
    candidate('middle', x, y - GAP_PX - more),
    candidate('middle', x, y + GAP_PX + 10),
    candidate('end', x - near, y - near - more),
    candidate('start', x + near, y - near - more),
    candidate('end', x - near, y + near + 10),
    candidate('start', x + near, y + near + 10),
  ]
}

function costOf(label: DrawnLabel, at: Point, inside: Point, { sizePx, obstacles }: Paper): number {
  const largest = boxOf(label, WIDEST_LETTER_PX)
  const isOff = largest.left < EDGE_PX || largest.right > sizePx - EDGE_PX || largest.top < EDGE_PX || largest.bottom > sizePx - EDGE_PX
  const box = boxOf(label, LETTER_PX)
  const covered = countWithin(box, obstacles)
  const middle = { x: (box.left + box.right) / 2, y: (box.top + box.bottom) / 2 }
  const inward = (middle.x - at.x) * (inside.x - at.x) + (middle.y - at.y) * (inside.y - at.y)
  const length = Math.hypot(middle.x - at.x, middle.y - at.y) * Math.hypot(inside.x - at.x, inside.y - at.y) || 1
  return (isOff ? OFF_PAPER_COST : 0) + covered + INWARD_COST * (inward / length + 1)
}

/** The room that a label takes at a size of letter. */
export function boxOf({ lines, at, anchor }: DrawnLabel, letterPx = LETTER_PX): Box {
  const width = Math.max(...lines.map(line => line.length)) * letterPx
  const left = at.x - { start: 0, middle: width / 2, end: width }[anchor]
  return { left, right: left + width, top: at.y - LINE_PX + 3, bottom: at.y + (lines.length - 1) * LINE_PX + 3 }
}

/** How many points lie in a box. */
export function countWithin({ left, right, top, bottom }: Box, points: readonly Point[]): number {
  return points.filter(({ x, y }) => x >= left && x <= right && y >= top && y <= bottom).length
}

/** Points along a label's middle, for later labels to keep away from. */
export function labelPoints(label: DrawnLabel): Point[] {
  const { left, right, top, bottom } = boxOf(label)
  return Array.from({ length: 7 }, (_, index) => ({ x: left + ((right - left) * index) / 6, y: (top + bottom) / 2 }))
}

/**
 * The emptiest of some boxes; of equal ones the first.
 * @param boxes at least one.
 * @param obstacles what stands on the paper, px.
 * @returns index of the box.
 */
export function emptiestBox(boxes: readonly Box[], obstacles: readonly Point[]): number {
  const counts = boxes.map(box => countWithin(box, obstacles))
  return counts.indexOf(Math.min(...counts))
}
