/**
 * Starts for a conic with times, without a guess.
 * Bound: for every (P, e, T) of the grid of the double stars one complex constant C of z = x + iy = C·Z, Z the unit orbit, or its mirror
 * image for motion with falling φ:  C = Σ w z Z̄ / Σ w |Z|².
 * Any e: from the conic without times, the mean anomaly of each direction against time is a straight line, by the law of areas.
 * Bound, where the conic without times is: for every frequency n of either sign the agreement |Σ exp(i(M − n t))| of its mean anomalies M.
 * Source: the grid: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
import { meanFromTrueRad, meanMotion, trueFromMeanRad } from '../conic/anomalies'
import { atan2, cos, hypot, sin, TWO_PI } from '../elementary'
import type { PlanePoint } from '../models/plane-measure'
import { radialSigma } from '../models/plane-motion'
import { wrapToHalfTurn } from '../models/relative-kepler'
import { localMinima, scanPeriods, type ScanCell } from './scan'
import { TABLE_BINS, unitOrbitTables, type UnitOrbitTable } from './unit-orbit-table'

/** The floor on periods, in parts of the span. */
const SHORTEST_SPAN_PART = 60
const FOLD_ABOVE = 128
const FOLDED_BINS = 128
const KEPT_OF_EACH_SENSE = 3
/** Steps of the frequency that is compared with the areas, in parts of 1/span. */
const AREAL_STEP = 0.05
/** A start this near to the parabola is moved beside it, where M is a proper angle. */
const BESIDE_PARABOLA = 1e-3

/** Places with weights, as bins of a table of mean anomalies at one period. */
interface Phased {
  count: number
  bin: Int32Array
  weight: Float64Array
  /** w x and w y. */
  x: Float64Array
  y: Float64Array
}

interface Fall {
  direct: number
  retrograde: number
}

function phasedPlaces(points: readonly PlanePoint[]): Phased {
  const count = points.length
  return { count, bin: new Int32Array(count), weight: new Float64Array(count), x: new Float64Array(count), y: new Float64Array(count) }
}

/** Phases at one period; many places are gathered into bins of phase. */
function phaseInto(points: readonly PlanePoint[], referenceEpochYr: number, periodYr: number, out: Phased): void {
  const isFolded = points.length > FOLD_ABOVE
  out.count = isFolded ? FOLDED_BINS : points.length
  if (isFolded) for (const sums of [out.weight, out.x, out.y]) sums.fill(0)
  points.forEach((point, i) => {
    const turns = (point.epochYr! - referenceEpochYr) / periodYr
    const phase = turns - Math.floor(turns)
    const sigma = radialSigma(point)
    const weight = point.weight / (sigma * sigma)
    const at = isFolded ? Math.min(FOLDED_BINS - 1, Math.floor(phase * FOLDED_BINS)) : i
    out.bin[at] = isFolded ? Math.floor(((at + 0.5) * TABLE_BINS) / FOLDED_BINS) : Math.floor(phase * TABLE_BINS)
    out.weight[at] = (isFolded ? out.weight[at]! : 0) + weight
    out.x[at] = (isFolded ? out.x[at]! : 0) + weight * point.r * cos(point.phiRad)
    out.y[at] = (isFolded ? out.y[at]! : 0) + weight * point.r * sin(point.phiRad)
  })
}

/** By how much χ² falls below Σ w |z|² with the best C, for both senses of motion. */
function fallInto(phased: Phased, table: UnitOrbitTable, shift: number, fall: Fall): void {
  let [xX, xY, yX, yY, size] = [0, 0, 0, 0, 0]
  for (let i = 0; i < phased.count; i++) {
    const at = (phased.bin[i]! - shift) & (TABLE_BINS - 1)
    const [X, Y, x, y] = [table.X[at]!, table.Y[at]!, phased.x[i]!, phased.y[i]!]
    xX += x * X
    xY += x * Y
    yX += y * X
    yY += y * Y
    size += phased.weight[i]! * (X * X + Y * Y)
  }
  fall.direct = ((xX + yY) * (xX + yY) + (yX - xY) * (yX - xY)) / size
  fall.retrograde = ((xX - yY) * (xX - yY) + (yX + xY) * (yX + xY)) / size
}

/** Best phase of every (P, e), for both senses. */
function scanSenses(points: readonly PlanePoint[], referenceEpochYr: number, periodsYr: readonly number[], onProgress: (part: number) => void): { direct: ScanCell[]; retrograde: ScanCell[] } {
  const cells: { direct: ScanCell[]; retrograde: ScanCell[] } = { direct: [], retrograde: [] }
  const phased = phasedPlaces(points.length > FOLD_ABOVE ? points.slice(0, FOLDED_BINS) : points)
  const fall: Fall = { direct: 0, retrograde: 0 }
  periodsYr.forEach((periodYr, periodIndex) => {
    phaseInto(points, referenceEpochYr, periodYr, phased)
    unitOrbitTables().forEach((table, eccentricityIndex) => {
      const best = { direct: -1, retrograde: -1 }
      const phase = { direct: 0, retrograde: 0 }
      for (let j = 0; j < table.phases; j++) {
        fallInto(phased, table, (j * TABLE_BINS) / table.phases, fall)
        for (const sense of ['direct', 'retrograde'] as const) {
          if (fall[sense] <= best[sense]) continue
          best[sense] = fall[sense]
          phase[sense] = j / table.phases
        }
      }
      const cell = { periodIndex, eccentricityIndex, periodYr, eccentricity: table.eccentricity }
      for (const sense of ['direct', 'retrograde'] as const) cells[sense].push({ ...cell, phase: phase[sense], chiSquare: -best[sense] })
    })
    if (periodIndex % 16 === 15) onProgress((periodIndex + 1) / periodsYr.length)
  })
  return cells
}

/** Parameters of a cell: C again at its (P, e, T), then p, k, h, H and the direction at the reference epoch. */
function startOfCell(points: readonly PlanePoint[], referenceEpochYr: number, cell: ScanCell, sense: 1 | -1): Float64Array {
  const { periodYr, eccentricity: e, phase } = cell
  let [re, im, size] = [0, 0, 0]
  for (const point of points) {
    const turns = (point.epochYr! - referenceEpochYr) / periodYr - phase
    const nu = sense * trueFromMeanRad((turns - Math.round(turns)) * TWO_PI, e)
    const r = (1 - e * e) / (1 + e * cos(nu))
    const weight = point.weight / radialSigma(point) / radialSigma(point)
    const turned = point.phiRad - nu
    re += weight * point.r * r * cos(turned)
    im += weight * point.r * r * sin(turned)
    size += weight * r * r
  }
  const a = hypot(re, im) / size
  const phi0 = atan2(im, re)
  const areal = (sense * TWO_PI * a * a * Math.sqrt(1 - e * e)) / periodYr
  return Float64Array.of(a * (1 - e * e), e * cos(phi0), e * sin(phi0), areal, phi0 + sense * trueFromMeanRad(-phase * TWO_PI, e))
}

/** Straight line through (t, M) by least squares: slope and value at the reference epoch. */
function straightLine(times: readonly number[], values: readonly number[]): { slope: number; value: number } {
  const mean = (list: readonly number[]) => list.reduce((sum, value) => sum + value, 0) / list.length
  const [t, m] = [mean(times), mean(values)]
  const slope = times.reduce((sum, time, i) => sum + (time - t) * (values[i]! - m), 0) / times.reduce((sum, time) => sum + (time - t) * (time - t), 0)
  return { slope, value: m - slope * t }
}

/**
 * A start by the law of areas from a conic without times.
 * @param points timed measures, sorted by epoch; neighbours are taken to be less than half a turn apart.
 * @param conic (p, k, h).
 * @param referenceEpochYr Julian year.
 * @returns the five parameters; null where a measured direction is not on the conic.
 * Source: Kepler 1609, Astronomia nova.
 */
export function startByAreas(points: readonly PlanePoint[], conic: ArrayLike<number>, referenceEpochYr: number): Float64Array | null {
  const [p, k, h] = [conic[0]!, conic[1]!, conic[2]!]
  const exact = hypot(k, h)
  const e = Math.abs(exact - 1) < BESIDE_PARABOLA ? 1 - BESIDE_PARABOLA : exact
  const phi0 = atan2(h, k)
  const means: number[] = []
  let nu = wrapToHalfTurn(points[0]!.phiRad - phi0)
  for (const point of points) {
    const wrapped = wrapToHalfTurn(point.phiRad - phi0)
    nu = e < 1 ? nu + wrapToHalfTurn(wrapped - nu) : wrapped
    means.push(meanFromTrueRad(nu, e))
  }
  const { slope, value } = straightLine(points.map((point) => point.epochYr! - referenceEpochYr), means)
  if (!(p > 0) || !(slope !== 0 && slope - slope === 0)) return null
  const unit = meanMotion({ periapsisDistance: p / (1 + e), eccentricity: e, gravitationalParameter: 1 })
  const areal = (slope / unit) * Math.sqrt(p)
  return Float64Array.of(p, e * cos(phi0), e * sin(phi0), areal, phi0 + trueFromMeanRad(value, e))
}

/** Agreement of mean anomalies with every frequency k × step, k from first to last: the phasors turn by a constant factor a step. */
function agreements(means: readonly number[], times: readonly number[], stepRad: number, steps: number): { length: number; phase: number }[] {
  const phasors = means.map((mean) => [cos(mean), sin(mean)] as [number, number])
  const turns = times.map((time) => [cos(stepRad * time), -sin(stepRad * time)] as const)
  return Array.from({ length: steps }, () => {
    let [re, im] = [0, 0]
    phasors.forEach((phasor, i) => {
      re += phasor[0]
      im += phasor[1]
      const [c, s] = turns[i]!
      ;[phasor[0], phasor[1]] = [phasor[0] * c - phasor[1] * s, phasor[0] * s + phasor[1] * c]
    })
    return { length: re * re + im * im, phase: atan2(im, re) }
  })
}

/**
 * Starts of bound motion along a known conic: the frequencies that its mean anomalies agree with best.
 * @param points timed measures, sorted by epoch, over some time.
 * @param conic (p, k, h).
 * @param referenceEpochYr Julian year.
 * @returns parameters, best first; none where e ≥ 1.
 * Source: Kepler 1609, Astronomia nova; the comparison is common practice for periodic data.
 */
export function startsByPeriodicity(points: readonly PlanePoint[], conic: ArrayLike<number>, referenceEpochYr: number): Float64Array[] {
  const [p, k, h] = [conic[0]!, conic[1]!, conic[2]!]
  const e = hypot(k, h)
  if (!(e < 1 - BESIDE_PARABOLA) || !(p > 0)) return []
  const phi0 = atan2(h, k)
  const spanYr = points[points.length - 1]!.epochYr! - points[0]!.epochYr!
  const times = points.map((point) => point.epochYr! - referenceEpochYr)
  const means = points.map((point) => meanFromTrueRad(wrapToHalfTurn(point.phiRad - phi0), e))
  const stepRad = (TWO_PI * AREAL_STEP) / spanYr
  const found = ([1, -1] as const).flatMap((sense) => {
    const table = agreements(means, times, sense * stepRad, Math.round(SHORTEST_SPAN_PART / AREAL_STEP))
    return table.map((entry, at) => ({ ...entry, at, sense }))
      .filter(({ length, at }) => at > 0 && length >= table[at - 1]!.length && length >= (table[at + 1]?.length ?? 0))
  }).sort((a, b) => b.length - a.length).slice(0, KEPT_OF_EACH_SENSE)
  const unit = meanMotion({ periapsisDistance: p / (1 + e), eccentricity: e, gravitationalParameter: 1 })
  return found.map(({ at, phase, sense }) => Float64Array.of(p, k, h, ((sense * at * stepRad) / unit) * Math.sqrt(p), phi0 + trueFromMeanRad(phase, e)))
}

/**
 * Starts of bound motion over all periods from a sixtieth of the span to twelve spans.
 * @param points timed measures, sorted by epoch, over some time.
 * @param referenceEpochYr Julian year.
 * @param onProgress called with the part done, 0 … 1.
 * @returns parameters of the best cells of both senses, best first.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
export function startsOfBoundMotion(points: readonly PlanePoint[], referenceEpochYr: number, onProgress: (part: number) => void): Float64Array[] {
  const spanYr = points[points.length - 1]!.epochYr! - points[0]!.epochYr!
  const cells = scanSenses(points, referenceEpochYr, scanPeriods(spanYr, spanYr / SHORTEST_SPAN_PART), onProgress)
  const kept = (['direct', 'retrograde'] as const).flatMap((sense) => localMinima(cells[sense]).slice(0, KEPT_OF_EACH_SENSE)
    .map((cell) => ({ cell, sense: sense === 'direct' ? 1 as const : -1 as const })))
  return kept.sort((a, b) => a.cell.chiSquare - b.cell.chiSquare).map(({ cell, sense }) => startOfCell(points, referenceEpochYr, cell, sense))
}
