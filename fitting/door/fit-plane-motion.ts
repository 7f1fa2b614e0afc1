/** The solution of a conic with times: starts by areas and by the scan, the best to convergence, the longest of periods that fit alike. */
import { hypot } from '../elementary'
import type { PlanePoint, PlanePoints } from '../models/plane-measure'
import { planeMotionProblem, PLANE_MOTION_NAMES } from '../models/plane-motion'
import { startByAreas, startsByPeriodicity, startsOfBoundMotion } from '../search/plane-motion-search'
import { isInsideDomain, type LeastSquaresProblem } from '../solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'
import type { FitStart } from '../types'
import { planeTimeQuantities } from '../uncertainty/plane-motion-elements'
import type { Report } from './progress'

const LEAST_EPOCHS = 3
/** Epochs closer than this are one (3 s). */
const SAME_EPOCH_YR = 1e-7
const SHORT_ITERATIONS = 8
const FULLY_SOLVED = 4
/** Minima whose χ² after the short solve is beyond this many times the best are left. */
const COMPETES_WITHIN = 30
/** Alternatives: χ² up to this much above the best, in units of the reduced χ² where that is above 1. */
const KEPT_WITHIN = 9
const ALIKE_WITHIN = 0.1
const SAME_WITHIN = 1e-4

/** Used measures with a time, sorted by it. */
export function timedPoints(used: readonly PlanePoint[]): PlanePoint[] {
  return used.filter((point) => point.epochYr !== null)
}

/**
 * Do the times suffice for a motion?
 * @param used measures, sorted.
 * @returns whether they are of three epochs at least.
 */
export function hasMotion(used: readonly PlanePoint[]): boolean {
  const timed = timedPoints(used)
  return timed.filter((point, i) => i === 0 || point.epochYr! - timed[i - 1]!.epochYr! > SAME_EPOCH_YR).length >= LEAST_EPOCHS
}

/** Middle of the arc, about which the parameters are least correlated. */
export function middleEpoch(used: readonly PlanePoint[]): number {
  const timed = timedPoints(used)
  return (timed[0]!.epochYr! + timed[timed.length - 1]!.epochYr!) / 2
}

function isSame(a: ArrayLike<number>, b: ArrayLike<number>): boolean {
  const shape = hypot(a[1]! - b[1]!, a[2]! - b[2]!)
  return shape < SAME_WITHIN && Math.abs(a[0]! - b[0]!) < SAME_WITHIN * a[0]! && Math.abs(a[3]! - b[3]!) < SAME_WITHIN * Math.abs(a[3]!)
}

function distinct(solutions: readonly Solution[]): Solution[] {
  const kept: Solution[] = []
  for (const solution of solutions) if (!kept.some((other) => isSame(other.values, solution.values))) kept.push(solution)
  return kept
}

const byChiSquare = (a: Solution, b: Solution) => a.chiSquare - b.chiSquare

function periodOf(solution: Solution, referenceEpochYr: number): number {
  return planeTimeQuantities(solution.values, referenceEpochYr).period?.value ?? Infinity
}

/** Puts the longest of the periods that fit alike first: equal intervals fit aliases exactly alike. */
function longestFirst(solutions: Solution[], degrees: number, referenceEpochYr: number): Solution[] {
  const [best] = solutions
  if (best === undefined) return []
  const unit = degrees > 0 ? Math.max(1, best.chiSquare / degrees) : 1
  const near = solutions.filter((solution) => solution.chiSquare - best.chiSquare <= KEPT_WITHIN * unit)
  const alike = near.filter((solution) => solution.chiSquare - best.chiSquare <= ALIKE_WITHIN * unit)
  const longest = alike.reduce((a, b) => (periodOf(b, referenceEpochYr) > periodOf(a, referenceEpochYr) ? b : a))
  return [longest, ...near.filter((solution) => solution !== longest)]
}

export interface MotionRequest {
  points: PlanePoints
  /** (p, k, h) without times. */
  conic: ArrayLike<number>
  start?: FitStart
  referenceEpochYr: number
  report: Report
}

function startsOf({ points, conic, start, referenceEpochYr, report }: MotionRequest): Float64Array[] {
  if (start !== undefined && start.state.values.length === PLANE_MOTION_NAMES.length) return [Float64Array.from(start.state.values)]
  const timed = timedPoints(points.used)
  const byAreas = startByAreas(timed, conic, referenceEpochYr)
  return [...(byAreas === null ? [] : [byAreas]), ...startsByPeriodicity(timed, conic, referenceEpochYr), ...startsOfBoundMotion(timed, referenceEpochYr, (part) => report('searching', part))]
}

function solveAll(problem: LeastSquaresProblem, starts: readonly Float64Array[]): Solution[] {
  const short = starts.filter((start) => isInsideDomain(problem, start)).map((start) => solveLeastSquares(problem, start, { maxIterations: SHORT_ITERATIONS }))
  const ranked = distinct(short.sort(byChiSquare)).slice(0, FULLY_SOLVED)
  const best = ranked.slice(0, 1).map((solution) => solveLeastSquares(problem, solution.values))
  const competing = ranked.slice(1).filter((solution) => solution.chiSquare <= COMPETES_WITHIN * best[0]!.chiSquare)
  return distinct([...best, ...competing.map((solution) => solveLeastSquares(problem, solution.values))].sort(byChiSquare))
}

/**
 * Solves for a conic with times.
 * @param request measures of three epochs at least, the conic without times, a start if there is one.
 * @returns distinct minima: the one given first, then those that fit almost as well; none where no start could be evaluated.
 */
export function solvePlaneMotion(request: MotionRequest): Solution[] {
  const { points, referenceEpochYr } = request
  const problem = planeMotionProblem(points.used, points.diameterScale, referenceEpochYr)
  return longestFirst(solveAll(problem, startsOf(request)), problem.rows - problem.parameters, referenceEpochYr)
}
