/**
 * Coarse scan over (P, e, T) with the linear solve inside; for every (P, e) the best phase of periastron is kept.
 * Frequencies run in steps of 0.2/span from 1/span up to 1/shortest period, periods in steps of 1.4 from span up to 12 spans.
 * Above 128 measures each frequency is folded into 128 bins of phase first. Where the errors along and across differ by less than
 * √3 the scan weighs both alike, which halves its cost; it only ranks, and what it ranks is polished with the true errors.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
import { factorLinear, type LinearSums } from './linear-constants'
import type { SearchPoints } from './search-points'
import { TABLE_BINS, unitOrbitTables, type UnitOrbitTable } from './unit-orbit-table'

const FREQUENCY_STEP = 0.2
const PERIOD_STEP = 1.4
const LONGEST_SPANS = 12
const FOLD_ABOVE = 128
const FOLD_BINS = 128
/** (a − b)/(a + b) of the two eigenvalues of M: errors that differ by √3. */
const LARGEST_ASYMMETRY = 0.5
/** Below this share of the product of its diagonal a determinant is rounding. */
const FLAT = 1e-11

/** One cell of the scan at its best phase. */
export interface ScanCell {
  periodIndex: number
  eccentricityIndex: number
  periodYr: number
  eccentricity: number
  /** Periastron passage as a part of the period after the reference epoch, 0 … 1. */
  phase: number
  chiSquare: number
}

/**
 * Periods of the scan, longest first.
 * @param spanYr time from first to last measure, yr, > 0.
 * @param shortestYr floor, yr, > 0.
 * @returns periods, yr, falling.
 */
export function scanPeriods(spanYr: number, shortestYr: number): number[] {
  const periods: number[] = []
  for (let period = spanYr * PERIOD_STEP; period < spanYr * LONGEST_SPANS; period *= PERIOD_STEP) periods.unshift(period)
  for (let k = 0; ; k++) {
    const period = spanYr / (1 + FREQUENCY_STEP * k)
    if (period < shortestYr) break
    periods.push(period)
  }
  const above = periods.filter((period) => period >= shortestYr)
  return above.length > 0 ? above : [shortestYr]
}

/** Points of one frequency: table bins at phase 0 and their information. */
interface Folded {
  count: number
  bins: Int32Array
  m11: Float64Array
  m12: Float64Array
  m22: Float64Array
  v1: Float64Array
  v2: Float64Array
}

function binOf(elapsedYr: number, periodYr: number): number {
  const turns = elapsedYr / periodYr
  return Math.floor((turns - Math.floor(turns)) * TABLE_BINS) & (TABLE_BINS - 1)
}

function makeFolded(points: SearchPoints): Folded {
  if (points.count <= FOLD_ABOVE) {
    const { count, m11, m12, m22, v1, v2 } = points
    return { count, bins: new Int32Array(count), m11, m12, m22, v1, v2 }
  }
  const array = () => new Float64Array(FOLD_BINS)
  const bins = Int32Array.from({ length: FOLD_BINS }, (_, i) => (i + 0.5) * (TABLE_BINS / FOLD_BINS))
  return { count: FOLD_BINS, bins, m11: array(), m12: array(), m22: array(), v1: array(), v2: array() }
}

function fold(points: SearchPoints, referenceEpochYr: number, periodYr: number, folded: Folded): void {
  if (points.count <= FOLD_ABOVE) {
    for (let i = 0; i < points.count; i++) folded.bins[i] = binOf(points.epochsYr[i]! - referenceEpochYr, periodYr)
    return
  }
  for (const sums of [folded.m11, folded.m12, folded.m22, folded.v1, folded.v2]) sums.fill(0)
  for (let i = 0; i < points.count; i++) {
    const bin = Math.floor(binOf(points.epochsYr[i]! - referenceEpochYr, periodYr) / (TABLE_BINS / FOLD_BINS))
    folded.m11[bin] = folded.m11[bin]! + points.m11[i]!
    folded.m12[bin] = folded.m12[bin]! + points.m12[i]!
    folded.m22[bin] = folded.m22[bin]! + points.m22[i]!
    folded.v1[bin] = folded.v1[bin]! + points.v1[i]!
    folded.v2[bin] = folded.v2[bin]! + points.v2[i]!
  }
}

const sums: LinearSums = {
  m11XX: 0, m11XY: 0, m11YY: 0, m12XX: 0, m12XY: 0, m12YY: 0, m22XX: 0, m22XY: 0, m22YY: 0, v1X: 0, v1Y: 0, v2X: 0, v2Y: 0,
}
const factored = new Float64Array(14)

/** Fall of χ² of one configuration; the hot loop of the scan. */
function fallOfChiSquare(folded: Folded, table: UnitOrbitTable, shift: number): number {
  const { count, bins, m11, m12, m22, v1, v2 } = folded
  const { X, Y } = table
  let a = 0, b = 0, c = 0, d = 0, e = 0, f = 0, g = 0, h = 0, k = 0, p = 0, q = 0, r = 0, s = 0
  for (let i = 0; i < count; i++) {
    const bin = (bins[i]! - shift) & (TABLE_BINS - 1)
    const x = X[bin]!
    const y = Y[bin]!
    const xx = x * x
    const xy = x * y
    const yy = y * y
    const w11 = m11[i]!
    const w12 = m12[i]!
    const w22 = m22[i]!
    a += w11 * xx
    b += w11 * xy
    c += w11 * yy
    d += w12 * xx
    e += w12 * xy
    f += w12 * yy
    g += w22 * xx
    h += w22 * xy
    k += w22 * yy
    p += v1[i]! * x
    q += v1[i]! * y
    r += v2[i]! * x
    s += v2[i]! * y
  }
  sums.m11XX = a
  sums.m11XY = b
  sums.m11YY = c
  sums.m12XX = d
  sums.m12XY = e
  sums.m12YY = f
  sums.m22XX = g
  sums.m22XY = h
  sums.m22YY = k
  sums.v1X = p
  sums.v1Y = q
  sums.v2X = r
  sums.v2Y = s
  return factorLinear(sums, factored)
}

/** The same with M = w·1: the two coordinates part into two problems of two unknowns; m11 holds w, v1 and v2 hold w·o. */
function fallOfChiSquareAlike(folded: Folded, table: UnitOrbitTable, shift: number): number {
  const { count, bins, m11, v1, v2 } = folded
  const { X, Y } = table
  let a = 0, b = 0, c = 0, p = 0, q = 0, r = 0, s = 0
  for (let i = 0; i < count; i++) {
    const bin = (bins[i]! - shift) & (TABLE_BINS - 1)
    const x = X[bin]!
    const y = Y[bin]!
    const wx = m11[i]! * x
    a += wx * x
    b += wx * y
    c += m11[i]! * y * y
    p += v1[i]! * x
    q += v1[i]! * y
    r += v2[i]! * x
    s += v2[i]! * y
  }
  const determinant = a * c - b * b
  if (!(determinant > FLAT * a * c)) return a > 0 ? (p * p + r * r) / a : 0
  return (c * (p * p + r * r) - 2 * b * (p * q + r * s) + a * (q * q + s * s)) / determinant
}

/** Errors along and across that differ by less than √3 at every measure. */
function hasErrorsAlike({ count, m11, m12, m22 }: SearchPoints): boolean {
  for (let i = 0; i < count; i++) {
    const difference = m11[i]! - m22[i]!
    const sum = m11[i]! + m22[i]!
    if (difference * difference + 4 * m12[i]! * m12[i]! > LARGEST_ASYMMETRY * LARGEST_ASYMMETRY * sum * sum) return false
  }
  return true
}

/** The points with w = (m₁₁ + m₂₂)/2 for both coordinates; o is recovered from v = M o. */
function withErrorsAlike(points: SearchPoints): SearchPoints {
  const { count, m11, m12, m22, v1, v2 } = points
  const array = () => new Float64Array(count)
  const alike: SearchPoints = { ...points, m11: array(), m12: array(), m22: array(), v1: array(), v2: array(), constant: 0 }
  for (let i = 0; i < count; i++) {
    const determinant = m11[i]! * m22[i]! - m12[i]! * m12[i]!
    const x = (m22[i]! * v1[i]! - m12[i]! * v2[i]!) / determinant
    const y = (m11[i]! * v2[i]! - m12[i]! * v1[i]!) / determinant
    const w = (m11[i]! + m22[i]!) / 2
    alike.m11[i] = alike.m22[i] = w
    alike.v1[i] = w * x
    alike.v2[i] = w * y
    alike.constant += w * (x * x + y * y)
  }
  return alike
}

/**
 * Scans all periods and eccentricities.
 * @param measured points of the used measures.
 * @param referenceEpochYr Julian year from which phases count.
 * @param periodsYr as made by scanPeriods.
 * @param onProgress called with the part done, 0 … 1.
 * @returns one cell for each period and eccentricity, by period index, then eccentricity index.
 */
export function scan(measured: SearchPoints, referenceEpochYr: number, periodsYr: readonly number[], onProgress: (part: number) => void): ScanCell[] {
  const cells: ScanCell[] = []
  const isAlike = hasErrorsAlike(measured)
  const points = isAlike ? withErrorsAlike(measured) : measured
  const fallOf = isAlike ? fallOfChiSquareAlike : fallOfChiSquare
  const folded = makeFolded(points)
  const tables = unitOrbitTables()
  periodsYr.forEach((periodYr, periodIndex) => {
    fold(points, referenceEpochYr, periodYr, folded)
    tables.forEach((table, eccentricityIndex) => {
      let best = -1
      let bestPhase = 0
      for (let j = 0; j < table.phases; j++) {
        const fall = fallOf(folded, table, (j * TABLE_BINS) / table.phases)
        if (fall > best) {
          best = fall
          bestPhase = j / table.phases
        }
      }
      cells.push({
        periodIndex, eccentricityIndex, periodYr, eccentricity: table.eccentricity, phase: bestPhase, chiSquare: points.constant - best,
      })
    })
    if (periodIndex % 16 === 15) onProgress((periodIndex + 1) / periodsYr.length)
  })
  return cells
}

/**
 * Cells that are no worse than their neighbours in period and eccentricity.
 * @param cells as returned by scan.
 * @returns the local minima, best first.
 */
export function localMinima(cells: readonly ScanCell[]): ScanCell[] {
  const width = unitOrbitTables().length
  const minima = cells.filter((cell) => {
    for (let dp = -1; dp <= 1; dp++) {
      for (let de = -1; de <= 1; de++) {
        const e = cell.eccentricityIndex + de
        if (e < 0 || e >= width || (dp === 0 && de === 0)) continue
        const neighbour = cells[(cell.periodIndex + dp) * width + e]
        if (neighbour !== undefined && neighbour.chiSquare < cell.chiSquare) return false
      }
    }
    return true
  })
  return minima.sort((a, b) => a.chiSquare - b.chiSquare || a.periodIndex - b.periodIndex || a.eccentricityIndex - b.eccentricityIndex)
}
