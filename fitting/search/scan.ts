/**
 * Coarse scan over (P, e, T) with the linear solve inside; for every (P, e) the best phase of periastron is kept.
 * Frequencies run in steps of 0.2/span from 1/span up to 1/shortest period, periods in steps of 1.4 from span up to 12 spans.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
import { fallOfChiSquare, fallOfChiSquareAlike, fold, hasErrorsAlike, makeFolded, withErrorsAlike } from './scan-sums'
import type { SearchPoints } from './search-points'
import { eccentricOrbitTables, TABLE_BINS, unitOrbitTables, type UnitOrbitTable } from './unit-orbit-table'

const FREQUENCY_STEP = 0.2
const PERIOD_STEP = 1.4
const LONGEST_SPANS = 12
const FINE_STEPS = 10
const FINE_FREQUENCY_STEP = 0.01
/** In periods. */
const FINE_PHASE_REACH = 0.08

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

/** What is scanned: periods, eccentricities, and the phases of periastron to try, as indices into each table's phases. */
export interface ScanGrid {
  periodsYr: readonly number[]
  tables: readonly UnitOrbitTable[]
  phasesOf: (table: UnitOrbitTable) => readonly number[]
}

/**
 * The coarse grid over everything.
 * @param spanYr time from first to last measure, yr, > 0.
 * @param shortestYr floor on the period, yr, > 0.
 * @returns periods of scanPeriods, four eccentricities, all phases.
 */
export function coarseGrid(spanYr: number, shortestYr: number): ScanGrid {
  const all = new Map(unitOrbitTables().map((table) => [table, Array.from({ length: table.phases }, (_, j) => j)]))
  return { periodsYr: scanPeriods(spanYr, shortestYr), tables: unitOrbitTables(), phasesOf: (table) => all.get(table)! }
}

/**
 * A fine grid about one minimum of high eccentricity: there the passages of periastron split χ² into many minima closer together than
 * the coarse steps.
 * @param periodYr of the minimum.
 * @param phase of its periastron, in periods after the reference epoch.
 * @param spanYr time from first to last measure, yr, > 0.
 * @returns frequencies within 0.1/span in steps of 0.01/span, e from 0.9 to 0.99, phases within 0.08.
 */
export function eccentricGrid(periodYr: number, phase: number, spanYr: number): ScanGrid {
  const steps = Array.from({ length: 2 * FINE_STEPS + 1 }, (_, k) => k - FINE_STEPS)
  const periodsYr = steps.map((k) => 1 / (1 / periodYr + (k * FINE_FREQUENCY_STEP) / spanYr)).filter((period) => period > 0)
  const phasesOf = ({ phases }: UnitOrbitTable) => {
    const middle = Math.round(phase * phases)
    const reach = Math.floor(FINE_PHASE_REACH * phases)
    return Array.from({ length: 2 * reach + 1 }, (_, j) => middle + j - reach)
  }
  return { periodsYr, tables: eccentricOrbitTables(), phasesOf }
}

/**
 * Scans a grid.
 * @param measured points of the used measures.
 * @param referenceEpochYr Julian year from which phases count.
 * @param grid periods, eccentricities, phases.
 * @param onProgress called with the part done, 0 … 1.
 * @returns one cell for each period and eccentricity, by period index, then eccentricity index.
 */
export function scan(measured: SearchPoints, referenceEpochYr: number, grid: ScanGrid, onProgress: (part: number) => void): ScanCell[] {
  const cells: ScanCell[] = []
  const isAlike = hasErrorsAlike(measured)
  const points = isAlike ? withErrorsAlike(measured) : measured
  const fallOf = isAlike ? fallOfChiSquareAlike : fallOfChiSquare
  const folded = makeFolded(points)
  grid.periodsYr.forEach((periodYr, periodIndex) => {
    fold(points, referenceEpochYr, periodYr, folded)
    grid.tables.forEach((table, eccentricityIndex) => {
      let best = -1
      let bestPhase = 0
      for (const j of grid.phasesOf(table)) {
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
    if (periodIndex % 16 === 15) onProgress((periodIndex + 1) / grid.periodsYr.length)
  })
  return cells
}

/**
 * Cells that are no worse than their neighbours in period and eccentricity.
 * @param cells as returned by scan.
 * @returns the local minima, best first.
 */
export function localMinima(cells: readonly ScanCell[]): ScanCell[] {
  const width = 1 + cells.reduce((largest, cell) => Math.max(largest, cell.eccentricityIndex), 0)
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
