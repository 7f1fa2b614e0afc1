/**
 * An orbit from nothing: scan, polish of the local minima, the best to convergence.
 * The result is a list of distinct minima in the seven regular parameters, best first; the seven-parameter solver takes it from there.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014; Golub & Pereyra 1973, SIAM J. Numer. Anal. 10, 413; Kaufman 1975, BIT 15, 49.
 */
import type { SkyMeasure } from '../models/sky-measure'
import { isSameMinimum, polish, startOf, type Polished } from './polish'
import { ProjectedOrbit } from './projected-orbit'
import { localMinima, scan, scanPeriods } from './scan'
import { chainedSigns, searchPoints } from './search-points'

const POLISHED_AT_MOST = 24
const SHORT_POLISH_STEPS = 6
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

function searchWithSigns(request: SearchRequest, signs: Int8Array): Polished[] {
  const points = searchPoints(request.measures, signs)
  const floorYr = Math.max(request.shortestPeriodYr, request.spanYr / SHORTEST_SPAN_PART)
  const cells = scan(points, request.referenceEpochYr, scanPeriods(request.spanYr, floorYr), (part) => request.onProgress(part * 0.7))
  const orbit = new ProjectedOrbit(points, request.referenceEpochYr)
  const roughly = localMinima(cells).slice(0, request.polishedAtMost ?? POLISHED_AT_MOST)
    .map((cell) => polish(orbit, startOf(cell), SHORT_POLISH_STEPS, 1e-3))
    .sort(byChiSquare)
  request.onProgress(0.85)
  const ranked = keepDistinct(roughly)
  const best = ranked.slice(0, 2).map((minimum) => polish(orbit, minimum.values.subarray(0, 3), LONG_POLISH_STEPS, 1e-9))
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
