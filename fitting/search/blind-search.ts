/**
 * An orbit from nothing: scan, polish of the local minima, the best to convergence.
 * The result is a list of distinct minima in the seven regular parameters, best first; the seven-parameter solver takes it from there.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014; Golub & Pereyra 1973, SIAM J. Numer. Anal. 10, 413; Kaufman 1975, BIT 15, 49.
 */
import { exp, TWO_PI } from '../elementary'
import { shapeOf } from '../models/relative-kepler'
import type { SkyMeasure } from '../models/sky-measure'
import { isSameMinimum, polish, startOf, type Polished } from './polish'
import { ProjectedOrbit } from './projected-orbit'
import { coarseGrid, eccentricGrid, localMinima, scan, type ScanCell } from './scan'
import { chainedSigns, searchPoints, type SearchPoints } from './search-points'

const POLISHED_AT_MOST = 24
const SHORT_POLISH_STEPS = 6
/** From this eccentricity on the neighbourhood of a minimum is scanned finely. */
const ECCENTRIC_FROM = 0.8
const FINE_POLISHED_AT_MOST = 8
/** Only minima whose χ² is up to this many times the best are looked at so closely. */
const PROMISING_WITHIN = 3
const LONG_POLISH_STEPS = 60
/** The floor on periods, in parts of the span. */
export const SHORTEST_SPAN_PART = 60

export interface SearchRequest {
  /** Used measures, sorted by epoch. */
  measures: readonly SkyMeasure[]
  referenceEpochYr: number
  spanYr: number
  shortestPeriodYr: number
  /** How far above the best χ² a minimum is still kept, in units of χ². */
  keepWithin: (bestChiSquare: number) => number
  /** Minima of the scan that are polished, at most; 24 where left out. */
  polishedAtMost?: number
  onProgress: (part: number) => void
}

function keepDistinct(minima: Polished[]): Polished[] {
  const kept: Polished[] = []
  for (const minimum of minima) {
    if (!kept.some((other) => isSameMinimum(other.values, minimum.values))) kept.push(minimum)
  }
  return kept
}

function byChiSquare(a: Polished, b: Polished): number {
  return a.chiSquare - b.chiSquare
}

/** Polishes the best cells a few steps. */
function polishRoughly(cells: readonly ScanCell[], orbit: ProjectedOrbit, atMost: number): Polished[] {
  return localMinima(cells).slice(0, atMost).map((cell) => polish(orbit, startOf(cell), SHORT_POLISH_STEPS, 1e-3))
}

function polishFully(orbit: ProjectedOrbit, minimum: Polished): Polished {
  return polish(orbit, minimum.values.subarray(0, 3), LONG_POLISH_STEPS, 1e-9)
}

/** Minima close about one of high eccentricity, polished; none where e is moderate. */
function aboutEccentric(minimum: Polished, points: SearchPoints, request: SearchRequest, orbit: ProjectedOrbit): Polished[] {
  const { values } = minimum
  const { eccentricity, varpiRad } = shapeOf(values[1]!, values[2]!)
  if (eccentricity < ECCENTRIC_FROM) return []
  const grid = eccentricGrid(exp(values[0]!), varpiRad / TWO_PI, request.spanYr)
  const cells = scan(points, request.referenceEpochYr, grid, () => undefined)
  const best = polishRoughly(cells, orbit, FINE_POLISHED_AT_MOST).sort(byChiSquare)[0]
  return best === undefined ? [] : [polishFully(orbit, best)]
}

function searchWithSigns(request: SearchRequest, signs: Int8Array): Polished[] {
  const points = searchPoints(request.measures, signs)
  const floorYr = Math.max(request.shortestPeriodYr, request.spanYr / SHORTEST_SPAN_PART)
  const cells = scan(points, request.referenceEpochYr, coarseGrid(request.spanYr, floorYr), (part) => request.onProgress(part * 0.7))
  const orbit = new ProjectedOrbit(points, request.referenceEpochYr)
  const ranked = keepDistinct(polishRoughly(cells, orbit, request.polishedAtMost ?? POLISHED_AT_MOST).sort(byChiSquare))
  request.onProgress(0.85)
  const converged = ranked.slice(0, 2).map((minimum) => polishFully(orbit, minimum))
  const least = Math.min(...converged.map((minimum) => minimum.chiSquare))
  const promising = converged.filter((minimum) => minimum.chiSquare <= PROMISING_WITHIN * least)
  const best = [...converged, ...promising.flatMap((minimum) => aboutEccentric(minimum, points, request, orbit))]
  const limit = request.keepWithin(Math.min(...best.map((minimum) => minimum.chiSquare)))
  const others = ranked.slice(2).filter((minimum) => minimum.chiSquare <= limit || !minimum.hasSettled)
    .map((minimum) => polish(orbit, minimum.values.subarray(0, 3), LONG_POLISH_STEPS / 2, 1e-6))
  request.onProgress(1)
  return keepDistinct([...best, ...others].sort(byChiSquare)).filter((minimum) => minimum.chiSquare <= limit)
}

/**
 * Searches for relative orbits without a starting guess.
 * @param request measures, reference epoch and span (yr), floor on the period (yr).
 * @returns distinct minima within keepWithin of the best, best first; at least one unless no orbit could be evaluated.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
export function searchRelative(request: SearchRequest): Polished[] {
  const asStated = new Int8Array(request.measures.length).fill(1)
  const minima = searchWithSigns(request, asStated)
  if (!request.measures.some((measure) => measure.isAmbiguous)) return minima
  const chained = searchWithSigns({ ...request, onProgress: () => undefined }, chainedSigns(request.measures))
  const all = keepDistinct([...minima, ...chained].sort(byChiSquare))
  const limit = request.keepWithin(all[0]?.chiSquare ?? Infinity)
  return all.filter((minimum) => minimum.chiSquare <= limit)
}
