import type { FitResult } from '../../fitting/types'
import { jdFromJulianEpoch } from '../../fitting/time'

const SAMPLES = 120
/** How far past the last measure the path is drawn, as a part of the arc, and within which days. */
const AHEAD = 0.6
const LEAST_AHEAD_DAYS = 15
const MOST_AHEAD_DAYS = 60
const BEFORE = 0.04
/** Round distances of marked dates, days. */
const STEPS_DAYS = [1, 2, 5, 10, 20, 30, 60, 120, 180, 365, 730, 1825, 3650]
const MARKS_AT_MOST = 9

/** The stretch of time that the drawings of a moving body show: its measures and some weeks more. Julian dates. */
export interface TrackSpan {
  fromJd: number
  lastMeasureJd: number
  toJd: number
}

/** From a little before the first used measure to some weeks past the last; null where the measures have no times. */
export function trackSpan(result: FitResult): TrackSpan | null {
  const { firstEpochYr, lastEpochYr } = result.statistics.arc
  if (firstEpochYr === null || lastEpochYr === null) return null
  const [first, last] = [jdFromJulianEpoch(firstEpochYr), jdFromJulianEpoch(lastEpochYr)]
  const ahead = Math.min(MOST_AHEAD_DAYS, Math.max(LEAST_AHEAD_DAYS, (last - first) * AHEAD))
  return { fromJd: first - (last - first) * BEFORE, lastMeasureJd: last, toJd: last + ahead }
}

/** Julian dates along the span, evenly, the last measure's among them. */
export function trackDates({ fromJd, lastMeasureJd, toJd }: TrackSpan): number[] {
  const even = Array.from({ length: SAMPLES + 1 }, (_, k) => fromJd + ((toJd - fromJd) * k) / SAMPLES)
  return [...even, lastMeasureJd].sort((a, b) => a - b)
}

/** Round days to mark between two Julian dates: 0 h of every first, second, fifth, tenth … day. */
export function markedDays(fromJd: number, toJd: number, atMost = MARKS_AT_MOST): number[] {
  const step = STEPS_DAYS.find(days => (toJd - fromJd) / days <= atMost) ?? STEPS_DAYS[STEPS_DAYS.length - 1]!
  const first = Math.ceil((fromJd - 0.5) / step) * step + 0.5
  return Array.from({ length: Math.max(0, Math.floor((toJd - first) / step) + 1) }, (_, k) => first + k * step)
}
