/**
 * The sums of the scan: points folded by a period, and the fall of χ² that the best constants give at one phase of periastron.
 * Above 128 measures each frequency is folded into 128 bins of phase first. Where the errors along and across differ by less than
 * √3 the scan weighs both alike, which halves its cost; it only ranks, and what it ranks is polished with the true errors.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
import { factorLinear, type LinearSums } from './linear-constants'
import type { SearchPoints } from './search-points'
import { TABLE_BINS, type UnitOrbitTable } from './unit-orbit-table'

const FOLD_ABOVE = 128
const FOLD_BINS = 128
/** (a − b)/(a + b) of the two eigenvalues of M: errors that differ by √3. */
const LARGEST_ASYMMETRY = 0.5
/** Below this share of the product of its diagonal a determinant is rounding. */
const FLAT = 1e-11

/** Points of one frequency: table bins at phase 0 and their information. */
export interface Folded {
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

/**
 * Room for the points of one frequency.
 * @param points of the search.
 * @returns the points themselves, or empty bins where there are more than 128.
 */
export function makeFolded(points: SearchPoints): Folded {
  if (points.count <= FOLD_ABOVE) {
    const { count, m11, m12, m22, v1, v2 } = points
    return { count, bins: new Int32Array(count), m11, m12, m22, v1, v2 }
  }
  const array = () => new Float64Array(FOLD_BINS)
  const bins = Int32Array.from({ length: FOLD_BINS }, (_, i) => (i + 0.5) * (TABLE_BINS / FOLD_BINS))
  return { count: FOLD_BINS, bins, m11: array(), m12: array(), m22: array(), v1: array(), v2: array() }
}

/**
 * Places the points on the phases of one period.
 * @param points of the search.
 * @param referenceEpochYr Julian year of phase 0.
 * @param periodYr yr, > 0.
 * @param folded receives bins, and sums where the points are folded.
 */
export function fold(points: SearchPoints, referenceEpochYr: number, periodYr: number, folded: Folded): void {
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

/**
 * Fall of χ² of one configuration; the hot loop of the scan.
 * @param folded points of one frequency.
 * @param table unit orbit of one eccentricity.
 * @param shift phase of periastron, in bins.
 * @returns χ² of a companion at the primary minus χ² at the best constants.
 */
export function fallOfChiSquare(folded: Folded, table: UnitOrbitTable, shift: number): number {
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

/**
 * The same with M = w·1: the two coordinates part into two problems of two unknowns; m11 holds w, v1 and v2 hold w·o.
 * @param folded points of one frequency.
 * @param table unit orbit of one eccentricity.
 * @param shift phase of periastron, in bins.
 * @returns as fallOfChiSquare.
 */
export function fallOfChiSquareAlike(folded: Folded, table: UnitOrbitTable, shift: number): number {
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

/**
 * True where errors along and across differ by less than √3 at every measure.
 * @param points of the search.
 * @returns whether the scan may weigh both alike.
 */
export function hasErrorsAlike({ count, m11, m12, m22 }: SearchPoints): boolean {
  for (let i = 0; i < count; i++) {
    const difference = m11[i]! - m22[i]!
    const sum = m11[i]! + m22[i]!
    if (difference * difference + 4 * m12[i]! * m12[i]! > LARGEST_ASYMMETRY * LARGEST_ASYMMETRY * sum * sum) return false
  }
  return true
}

/**
 * The points with w = (m₁₁ + m₂₂)/2 for both coordinates; o is recovered from v = M o.
 * @param points whose M all have rank two.
 * @returns points with errors alike.
 */
export function withErrorsAlike(points: SearchPoints): SearchPoints {
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
