import { formatNumber, MINUS } from '../units/number-text'
import type { Point } from './conic-outline'
import type { SkyDirection } from './sky-projection'

/** Distances between lines of declination (degrees) and of right ascension (minutes of time). */
const DEC_STEPS_DEG = [1 / 60, 2 / 60, 5 / 60, 10 / 60, 20 / 60, 0.5, 1, 2, 5, 10, 15, 30]
const RA_STEPS_MIN = [0.25, 0.5, 1, 2, 5, 10, 20, 30, 60, 120, 180, 360]
const DEG_A_MINUTE_OF_TIME = 0.25
const LINES = 4.5
const SAMPLES = 48
const STEEPEST_COS = 0.08
const EDGE_PX = 6
const LABEL_ROOM_PX = 34

export interface Graticule {
  /** Path data of the lines. */
  grid: string[]
  labels: { at: Point; text: string; anchor: 'start' | 'middle' }[]
}

interface Field {
  middle: SkyDirection
  toPx: (direction: SkyDirection) => Point
  /** Width of the sheet, degrees. */
  fieldDeg: number
  sizePx: number
}

/** Lines of right ascension and declination over the sheet, each labelled where it meets the lower or the left edge. */
export function graticule(field: Field): Graticule {
  const { middle, fieldDeg } = field
  const decStep = pick(DEC_STEPS_DEG, fieldDeg / LINES)
  const cosDec = Math.max(STEEPEST_COS, Math.cos((middle.decDeg * Math.PI) / 180))
  const raStep = pick(RA_STEPS_MIN, fieldDeg / cosDec / LINES / DEG_A_MINUTE_OF_TIME) * DEG_A_MINUTE_OF_TIME
  const half = Math.min(89, fieldDeg * 0.75)
  const halfRa = Math.min(180, half / cosDec)
  const decs = multiples(decStep, Math.max(-90, middle.decDeg - half), Math.min(90, middle.decDeg + half))
  const ras = multiples(raStep, middle.raDeg - halfRa, middle.raDeg + halfRa)
  const lines = [
    ...decs.map(decDeg => ({ points: along(middle.raDeg - halfRa, middle.raDeg + halfRa, raDeg => field.toPx({ raDeg, decDeg })), edge: 'left' as const, text: decText(decDeg, decStep) })),
    ...ras.map(raDeg => ({ points: along(Math.max(-90, middle.decDeg - half), Math.min(90, middle.decDeg + half), decDeg => field.toPx({ raDeg, decDeg })), edge: 'bottom' as const, text: raText(raDeg, raStep) })),
  ]
  return {
    grid: lines.map(({ points }) => `M${points.map(({ x, y }) => `${tenth(x)} ${tenth(y)}`).join('L')}`),
    labels: lines.flatMap(line => labelAt(line, field.sizePx)),
  }
}

function pick(steps: readonly number[], atLeast: number): number {
  return steps.find(step => step >= atLeast) ?? steps[steps.length - 1]!
}

function multiples(step: number, from: number, to: number): number[] {
  const [first, last] = [Math.ceil(from / step - 1e-9), Math.floor(to / step + 1e-9)]
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => (first + k) * step)
}

function along(from: number, to: number, at: (value: number) => Point): Point[] {
  return Array.from({ length: SAMPLES + 1 }, (_, k) => at(from + ((to - from) * k) / SAMPLES))
}

/** The label beside the point at which a line crosses the edge of the paper; none where that is in a corner. */
function labelAt({ points, edge, text }: { points: Point[]; edge: 'left' | 'bottom'; text: string }, sizePx: number): Graticule['labels'] {
  const [across, onward] = edge === 'left' ? ['x', 'y'] as const : ['y', 'x'] as const
  const border = edge === 'left' ? EDGE_PX : sizePx - EDGE_PX
  for (let k = 1; k < points.length; k++) {
    const [from, to] = [points[k - 1]!, points[k]!]
    if ((from[across] - border) * (to[across] - border) > 0 || from[across] === to[across]) continue
    const part = (border - from[across]) / (to[across] - from[across])
    const place = from[onward] + part * (to[onward] - from[onward])
    if (place < LABEL_ROOM_PX || place > sizePx - LABEL_ROOM_PX) return []
    return [edge === 'left' ? { at: { x: EDGE_PX, y: tenth(place - 4) }, text, anchor: 'start' } : { at: { x: tenth(place), y: sizePx - EDGE_PX - 2 }, text, anchor: 'middle' }]
  }
  return []
}

function raText(raDeg: number, stepDeg: number): string {
  const minutes = (((raDeg / DEG_A_MINUTE_OF_TIME) % 1440) + 1440) % 1440
  const whole = Math.floor(minutes + 1e-6)
  const [hours, rest] = [Math.floor(whole / 60), whole % 60]
  const seconds = Math.round((minutes - whole) * 60)
  if (stepDeg >= 15) return `${hours}ʰ`
  return `${hours}ʰ ${String(rest).padStart(2, '0')}ᵐ${stepDeg < DEG_A_MINUTE_OF_TIME ? ` ${String(seconds).padStart(2, '0')}ˢ` : ''}`
}

function decText(decDeg: number, stepDeg: number): string {
  const minutes = Math.round(Math.abs(decDeg) * 60)
  const sign = minutes === 0 ? '' : decDeg < 0 ? MINUS : '+'
  const degrees = `${sign}${formatNumber(Math.floor(minutes / 60), 0)}°`
  return stepDeg < 1 ? `${degrees} ${String(minutes % 60).padStart(2, '0')}′` : degrees
}

function tenth(px: number): number {
  return Math.round(px * 10) / 10
}
