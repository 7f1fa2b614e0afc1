/**
 * Starts where period, eccentricity or time of periastron is held: the same grid as the blind search, with the held values in place of
 * the grid's, and the four constants by a linear solve at every point. The best point of each period is kept where no neighbour is better.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
import { atanh, cos, exp, log, sin, TWO_PI } from '../elementary'
import { heldShape, type Held } from '../models/held-orbit'
import { SHORTEST_SPAN_PART, type SearchRequest } from './blind-search'
import { ProjectedOrbit } from './projected-orbit'
import { scanPeriods } from './scan'
import { chainedSigns, searchPoints } from './search-points'

const ECCENTRICITIES = [0.1, 0.5, 0.8, 0.93]
const HELD_SHAPES = ECCENTRICITIES.map(atanh)
const PHASES = 32
const ECCENTRIC_PHASES = 96
const ECCENTRIC_FROM = atanh(0.85)
/** Measures that rank the grid, at most; the fit itself takes all. */
const RANKED_ON = 160
const KEPT = 12

interface Point {
  values: Float64Array
  chiSquare: number
}

/** ϖ to try at one period and shape. */
function directionsOf(held: Held, referenceEpochYr: number, periodYr: number, s: number): number[] {
  if (s === 0) return [0]
  if (held.periastronTime !== undefined) return [(TWO_PI * (held.periastronTime - referenceEpochYr)) / periodYr]
  const phases = s > ECCENTRIC_FROM ? ECCENTRIC_PHASES : PHASES
  return Array.from({ length: phases }, (_, k) => (k * TWO_PI) / phases)
}

function bestAt(orbit: ProjectedOrbit, held: Held, referenceEpochYr: number, periodYr: number): Point | null {
  const own = heldShape(held)
  let best: Point | null = null
  for (const s of own === null ? HELD_SHAPES : [own]) {
    for (const varpi of directionsOf(held, referenceEpochYr, periodYr, s)) {
      if (!orbit.evaluate(Float64Array.of(log(periodYr), s * cos(varpi), s * sin(varpi)), false) || orbit.chiSquare >= (best?.chiSquare ?? Infinity)) continue
      const [A, F, B, G] = orbit.constants
      best = { chiSquare: orbit.chiSquare, values: Float64Array.of(log(periodYr), s * cos(varpi), s * sin(varpi), A!, B!, F!, G!) }
    }
  }
  return best
}

/**
 * Regular orbits to start a fit with held elements from.
 * @param request as for the blind search.
 * @param held at least one of period, eccentricity, periastronTime.
 * @returns at most twelve, best first.
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014.
 */
export function searchHeld(request: SearchRequest, held: Held): Float64Array[] {
  const every = 1 + Math.floor((request.measures.length - 1) / RANKED_ON)
  const ranked = request.measures.filter((_, i) => i % every === 0)
  const points = searchPoints(ranked, chainedSigns(ranked))
  const orbit = new ProjectedOrbit(points, request.referenceEpochYr)
  const floorYr = Math.max(request.shortestPeriodYr, request.spanYr / SHORTEST_SPAN_PART)
  const periods = held.period === undefined ? scanPeriods(request.spanYr, floorYr) : [held.period]
  const found = periods.map((periodYr, k) => {
    if (k % 16 === 15) request.onProgress((k + 1) / periods.length)
    return bestAt(orbit, held, request.referenceEpochYr, periodYr)
  })
  const chiSquareAt = (k: number) => found[k]?.chiSquare ?? Infinity
  return found.flatMap((point, k) => (point !== null && point.chiSquare <= chiSquareAt(k - 1) && point.chiSquare <= chiSquareAt(k + 1) ? [point] : []))
    .sort((a, b) => a.chiSquare - b.chiSquare || exp(b.values[0]!) - exp(a.values[0]!))
    .slice(0, KEPT).map(({ values }) => values)
}
