/** Tables of the unit orbit (cos E − e, √(1 − e²) sin E) by mean anomaly, for the coarse scan. */
import { solveKeplerInto } from '../conic/kepler'
import { TWO_PI } from '../elementary'

/** Bins of mean anomaly in a table; a power of two, so that a phase wraps by a mask. */
export const TABLE_BINS = 8192

export interface UnitOrbitTable {
  eccentricity: number
  /** Phases of periastron that the scan tries. */
  phases: number
  X: Float64Array
  Y: Float64Array
}

function makeTable(eccentricity: number, phases: number): UnitOrbitTable {
  const X = new Float64Array(TABLE_BINS)
  const Y = new Float64Array(TABLE_BINS)
  const anomaly = new Float64Array(3)
  const minor = Math.sqrt(1 - eccentricity * eccentricity)
  for (let i = 0; i < TABLE_BINS; i++) {
    solveKeplerInto(((i + 0.5) / TABLE_BINS) * TWO_PI, eccentricity, anomaly)
    X[i] = anomaly[2]! - eccentricity
    Y[i] = minor * anomaly[1]!
  }
  return { eccentricity, phases, X, Y }
}

let tables: UnitOrbitTable[] | null = null
let eccentricTables: UnitOrbitTable[] | null = null

/**
 * The coarse scan's tables, made once.
 * @returns eccentricities 0.1, 0.5, 0.8, 0.93 with 16, 32, 32, 64 phases.
 */
export function unitOrbitTables(): UnitOrbitTable[] {
  tables ??= [makeTable(0.1, 16), makeTable(0.5, 32), makeTable(0.8, 32), makeTable(0.93, 64)]
  return tables
}

/**
 * The fine scan's tables, made when first needed.
 * @returns eccentricities 0.9, 0.95, 0.975, 0.99 with 256 phases each.
 */
export function eccentricOrbitTables(): UnitOrbitTable[] {
  eccentricTables ??= [makeTable(0.9, 256), makeTable(0.95, 256), makeTable(0.975, 256), makeTable(0.99, 256)]
  return eccentricTables
}
