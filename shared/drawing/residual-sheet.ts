import { jdFromJulianEpoch, julianEpochFromJd } from '../../fitting/time'
import { formatJulianDay } from '../units/date-text'
import { formatNumber } from '../units/number-text'
import { axisTicks, roundStep, ticksEvery, type AxisTicks } from './axis-ticks'
import { halfHeight, type ResidualChart, type ResidualSeries } from './residual-series'
import { markedDays } from './track-dates'

const ROW_PX = 104
const ROW_GAP_PX = 34
const TOP_PX = 22
const AXIS_PX = 24
const LEFT_PX = 54
const RIGHT_PX = 16

export interface ResidualRow {
  series: ResidualSeries
  topPx: number
  bottomPx: number
  zeroPx: number
  ticks: { px: number; value: number; decimals: number }[]
  /** Path of the prediction's ±σ band; empty where no σ is known. */
  band: string
  /** Points outside the row's height are drawn at its edge. */
  marks: { id: string; x: number; y: number; isUsed: boolean; isBeyond: boolean }[]
}

/** Residual plots in pixels: one row a coordinate over a shared axis. */
export interface ResidualSheet {
  widthPx: number
  heightPx: number
  leftPx: number
  rightPx: number
  axis: { px: number; value: number; text: string }[]
  nowPx: number | null
  rows: ResidualRow[]
}

/** The stretch of the axis that is shown: all points and the band, with a little room; a whole turn of φ. */
export function axisRange(chart: ResidualChart): [number, number] {
  if (chart.axis === 'direction') return [0, 360]
  const places = chart.series.flatMap(series => [...series.points, ...series.band].map(point => point.at))
  const [least, greatest] = [places.reduce((a, b) => Math.min(a, b), Infinity), places.reduce((a, b) => Math.max(a, b), -Infinity)]
  const room = (greatest - least) * 0.02 || 0.5
  return [least - room, greatest + room]
}

/** Ticks of the shared axis for a width, with their words: every 30° or 90° of φ, round years, or round days. */
export function axisTicksFor(chart: ResidualChart, widthPx: number): { value: number; text: string }[] {
  const [least, greatest] = axisRange(chart)
  const isWide = widthPx > 600
  if (chart.axis === 'date') {
    const days = markedDays(jdFromJulianEpoch(least), jdFromJulianEpoch(greatest), isWide ? 12 : 5)
    return days.map((jd, index) => ({ value: julianEpochFromJd(jd), text: formatJulianDay(jd, isWide && index === 0) }))
  }
  const ticks = chart.axis === 'direction' ? ticksEvery(least, greatest, isWide ? 30 : 90) : axisTicks(least, greatest, isWide ? 9 : 5)
  return ticks.values.map(value => ({ value, text: `${formatNumber(value, ticks.decimals)}${chart.axis === 'direction' ? '°' : ''}` }))
}

/**
 * Lays the residuals out at a width.
 * @param chart with at least one series.
 * @param widthPx of the whole drawing.
 * @param nowAt where today's line is drawn on a time axis, Julian year.
 * @returns rows, axis and marks in pixels.
 */
export function residualSheet(chart: ResidualChart, widthPx: number, nowAt: number): ResidualSheet {
  const [least, greatest] = axisRange(chart)
  const x = (at: number) => tenth(LEFT_PX + ((at - least) / (greatest - least)) * (widthPx - LEFT_PX - RIGHT_PX))
  const ticks = axisTicksFor(chart, widthPx)
  const isNowShown = chart.axis !== 'direction' && nowAt > least && nowAt < greatest
  const rowsPx = chart.series.length * ROW_PX + (chart.series.length - 1) * ROW_GAP_PX
  return {
    widthPx,
    heightPx: TOP_PX + rowsPx + AXIS_PX,
    leftPx: LEFT_PX,
    rightPx: widthPx - RIGHT_PX,
    axis: ticks.map(tick => ({ ...tick, px: x(tick.value) })),
    nowPx: isNowShown ? x(nowAt) : null,
    rows: chart.series.map((series, index) => rowOf(series, TOP_PX + index * (ROW_PX + ROW_GAP_PX), x)),
  }
}

/** Zero and one or two round values on either side of it. */
export function residualTicks(series: ResidualSeries): AxisTicks {
  const half = halfHeight(series)
  return ticksEvery(-half, half, roundStep(half * 0.36))
}

function rowOf(series: ResidualSeries, topPx: number, x: (at: number) => number): ResidualRow {
  const half = halfHeight(series)
  const zeroPx = topPx + ROW_PX / 2
  const y = (value: number) => tenth(zeroPx - (Math.min(half, Math.max(-half, value)) / half) * (ROW_PX / 2))
  const ticks = residualTicks(series)
  return {
    series, topPx, zeroPx,
    bottomPx: topPx + ROW_PX,
    ticks: ticks.values.map(value => ({ value, decimals: ticks.decimals, px: y(value) })),
    band: bandPath(series, x, y),
    marks: series.points.map(point => ({
      id: point.id, x: x(point.at), y: y(point.value), isUsed: point.status === 'used', isBeyond: Math.abs(point.value) > half,
    })),
  }
}

function bandPath({ band }: ResidualSeries, x: (at: number) => number, y: (value: number) => number): string {
  if (band.length < 2) return ''
  const upper = band.map(({ at, sigma }) => `${x(at)} ${y(sigma)}`)
  const lower = [...band].reverse().map(({ at, sigma }) => `${x(at)} ${y(-sigma)}`)
  return `M${[...upper, ...lower].join('L')}Z`
}

function tenth(px: number): number {
  return Math.round(px * 10) / 10
}
