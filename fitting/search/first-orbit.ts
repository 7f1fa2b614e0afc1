/**
 * An orbit about the Sun without a starting guess: Gauss's method on five well-spread triples with all roots, together with the search
 * over the two end distances; every candidate is polished on all measures, and the best χ² wins.
 *
 * Long lists are thinned to at most 14 measures spread evenly in time for the search and the first polish.
 *
 * Sources: as gauss-angles.ts and end-distances.ts.
 */
import type { Vector } from '../conic/state'
import { moveInto } from '../conic/universal'
import { LIGHT_AU_PER_D, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth/constants'
import { sightMap, sightOfState } from '../models/sight-frame'
import { sunMotion } from '../models/line-of-sight'
import { sightProblem, type Sight } from '../models/sight-rows'
import { isInsideDomain } from '../solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'
import type { SightReference } from '../types'
import { searchEndDistances } from './end-distances'
import { refinedAngleOrbit, roughAngleOrbits, type Direction } from './gauss-angles'

const THINNED_TO = 14
const GRID_CANDIDATES = 14
const GRID_CANDIDATES_FOR_THREE = 40
/** Steps of the first polish, and how many of its results are followed to the end. */
const FIRST_POLISH = 30
const FOLLOWED = 5
/** Where the list was thinned, only what comes this close to the best χ² of the thinned one is followed. */
const WORTH_FOLLOWING = { times: 4, plus: 100 }
/** Two solutions are one where no parameter differs by more than this part of it, or of the second number where it is smaller. */
const SAME_WITHIN = 1e-4
const USUAL = 0.01


/** At most `count` sights spread evenly in time: the nearest to each of `count` even times. */
function thinned<S extends Sight>(sights: readonly S[], count: number): S[] {
  if (sights.length <= count) return [...sights]
  const first = sights[0]!.jdTt
  const span = sights[sights.length - 1]!.jdTt - first
  const kept = new Set<number>()
  for (let k = 0; k < count; k++) {
    const wanted = first + (span * k) / (count - 1)
    let best = 0
    for (let i = 1; i < sights.length; i++) if (Math.abs(sights[i]!.jdTt - wanted) < Math.abs(sights[best]!.jdTt - wanted)) best = i
    kept.add(best)
  }
  return [...kept].sort((a, b) => a - b).map((i) => sights[i]!)
}

/** Five triples: whole arc, both halves, and two in between. */
const TRIPLES = [[0, 0.5, 1], [0, 0.5, 0.75], [0.25, 0.5, 1], [0, 0.3, 0.7], [0.2, 0.6, 1]] as const

function triplesOf(sights: readonly Sight[]): Sight[][] {
  const first = sights[0]!.jdTt
  const span = sights[sights.length - 1]!.jdTt - first
  const nearest = (part: number) => sights.reduce((best, sight) => (Math.abs(sight.jdTt - first - part * span) < Math.abs(best.jdTt - first - part * span) ? sight : best))
  const triples = TRIPLES.map((parts) => parts.map(nearest)).filter(([a, b, c]) => a!.jdTt < b!.jdTt && b!.jdTt < c!.jdTt)
  const keys = triples.map((triple) => triple.map((sight) => sights.indexOf(sight)).join())
  return triples.filter((_, i) => keys.indexOf(keys[i]!) === i)
}

function directionOf(sight: Sight): Direction {
  const [o, a] = [sight.observer, sight.axes]
  return { time: sight.jdTt, line: [a[0]!, a[1]!, a[2]!] as Vector, observer: [o[0]!, o[1]!, o[2]!] as Vector }
}

function statesByGauss(sights: readonly Sight[], epochJdTt: number): Float64Array[] {
  return triplesOf(sights).flatMap((triple) => {
    const directions = triple.map(directionOf) as [Direction, Direction, Direction]
    const problem = { directions, mu: MU, lightSpeed: LIGHT_AU_PER_D }
    return roughAngleOrbits(problem).flatMap((rough) => {
      const refined = refinedAngleOrbit(problem, rough)
      return refined === rough ? [rough] : [refined, rough]
    }).map((orbit) => stateAt(orbit.state, orbit.time, epochJdTt)).filter((state) => state !== null)
  })
}

function stateAt(state: Float64Array, jdTt: number, epochJdTt: number): Float64Array | null {
  const moved = new Float64Array(6)
  return moveInto(state, MU, epochJdTt - jdTt, moved) ? moved : null
}

/**
 * Are two sets of six numbers the same orbit?
 * @param a parameters, or a state.
 * @param b the same of the other.
 * @returns true where none differs by more than 1e-4 of the larger, or of what is usual at 1 au.
 */
export function isSameOrbit(a: ArrayLike<number>, b: ArrayLike<number>): boolean {
  for (let j = 0; j < a.length; j++) {
    if (Math.abs(a[j]! - b[j]!) > SAME_WITHIN * Math.max(Math.abs(a[j]!), Math.abs(b[j]!), USUAL)) return false
  }
  return true
}

/**
 * Settles the distinct ones among starts, best first.
 * @param problem of all sights.
 * @param starts parameters.
 * @param maxIterations of each.
 * @returns solutions without doubles, growing χ².
 */
export function settleDistinct(problem: ReturnType<typeof sightProblem>, starts: readonly ArrayLike<number>[], maxIterations: number): Solution[] {
  const solutions: Solution[] = []
  for (const start of starts) if (isInsideDomain(problem, start)) solutions.push(solveLeastSquares(problem, start, { maxIterations }))
  solutions.sort((a, b) => a.chiSquare - b.chiSquare)
  return solutions.filter((solution, i) => solutions.slice(0, i).every((other) => !isSameOrbit(other.values, solution.values)))
}

/**
 * Orbits from nothing.
 * @param sights used, in order of time, at least three times apart.
 * @param reference line of sight and Earth at the epoch of the parameters.
 * @returns settled orbits, best first; none where no candidate is defined.
 * Source: as gauss-angles.ts and end-distances.ts.
 */
export function searchFirstOrbits(sights: readonly Sight[], reference: SightReference): Solution[] {
  const few = thinned(sights, THINNED_TO)
  const epoch = reference.jdTt
  const grid = searchEndDistances(few, few.length === 3 ? GRID_CANDIDATES_FOR_THREE : GRID_CANDIDATES).map((candidate) => stateAt(candidate.state, candidate.jdTt, epoch)).filter((state) => state !== null)
  const states = [...statesByGauss(few, epoch), ...grid]
  const starts = states.map((state) => sightOfState(reference, state)).filter((values) => values.every((value) => value - value === 0))
  const map = sightMap(reference)
  const motion = sunMotion(epoch)
  const polished = settleDistinct(sightProblem(few, map, motion), starts, FIRST_POLISH)
  const limit = few.length < sights.length ? WORTH_FOLLOWING.times * (polished[0]?.chiSquare ?? 0) + WORTH_FOLLOWING.plus : Infinity
  const followed = polished.slice(0, sights.length === 3 ? polished.length : FOLLOWED).filter(({ chiSquare }) => chiSquare <= limit).map(({ values }) => values)
  return settleDistinct(sightProblem(sights, map, motion), followed, 200)
}
