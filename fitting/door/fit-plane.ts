/** A conic from directions and distances in its plane, from request to result. */
import { atan2, hypot } from '../elementary'
import { planeMotionProblem } from '../models/plane-motion'
import { planeProblem, PLANE_NAMES, parabolaProblem, reciprocalProblem } from '../models/plane'
import { preparePlanePoints, rescalePlanePoints, type PlanePoints } from '../models/plane-measure'
import { isInsideDomain, type LeastSquaresProblem } from '../solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'
import type { FitResult, FitSettings, FitStart, PlaneMeasure } from '../types'
import { hasMotion, middleEpoch, solvePlaneMotion } from './fit-plane-motion'
import { planeCovariance, solveHeldPlane } from './hold-plane'
import { judgePlane } from './judge-plane'
import type { Report } from './progress'
import { refuse } from './refusal'
import { heldOfPlane } from './validate-held'
import { validatePlane } from './validate-measures'

export interface PlaneRequest {
  measures: PlaneMeasure[]
  settings: FitSettings
  start?: FitStart
  report: Report
}

/** Directions closer than this count as one, rad (0.2″). */
const SAME_DIRECTION_RAD = 1e-6
const START_SHRINK = 0.9

function checkEnough(points: PlanePoints, settings: FitSettings): void {
  const { used } = points
  if (used.length < PLANE_NAMES.length) refuse('too-few-measures', `A conic has 3 unknowns; ${used.length} measures are used.`, 'Use at least three measures in different directions.')
  const directions = used.map((point) => point.phiRad)
  const distinct = directions.filter((phi, i) => directions.slice(0, i).every((other) => !isSameDirection(phi, other))).length
  if (distinct === 1) refuse('one-direction', 'All used measures lie in one direction: nothing shows the shape.', 'Add measures in other directions.')
  if (distinct < PLANE_NAMES.length) refuse('too-few-measures', `The used measures lie in ${distinct} directions; a conic needs three.`, 'Add measures in other directions.')
  const coordinates = new Set(used.map((point) => point.coordinate))
  if (coordinates.size > 1 && settings.diameterScaleArcmin === undefined) {
    refuse('setting-out-of-range', 'Distances and apparent diameters stand together, but no scale links them.', 'Give diameterScaleArcmin, the diameter in arcmin at a distance of one unit.')
  }
}

function isSameDirection(a: number, b: number): boolean {
  const turns = (a - b) / 6.283185307179586
  return Math.abs(turns - Math.round(turns)) * 6.283185307179586 < SAME_DIRECTION_RAD
}

/** Shrinks e until the start is defined at every measured direction. */
function shrunkInside(points: PlanePoints, start: Float64Array): Float64Array {
  const problem = planeProblem(points.used, points.diameterScale)
  const shrunk = Float64Array.from(start)
  for (let i = 0; i < 200 && !isInsideDomain(problem, shrunk); i++) {
    shrunk[1] = shrunk[1]! * START_SHRINK
    shrunk[2] = shrunk[2]! * START_SHRINK
  }
  return shrunk
}

function startOf(points: PlanePoints, start: FitStart | undefined): Float64Array {
  if (start) return shrunkInside(points, Float64Array.from(start.state.values.slice(0, PLANE_NAMES.length)))
  const linear = solveLeastSquares(reciprocalProblem(points.used), [1 / points.used[0]!.r, 0, 0]).values
  if (linear[0]! > 0) return shrunkInside(points, Float64Array.of(1 / linear[0]!, linear[1]! / linear[0]!, linear[2]! / linear[0]!))
  const mean = points.used.reduce((sum, point) => sum + point.r, 0) / points.used.length
  return Float64Array.of(mean, 0, 0)
}

/** χ² with e = 1 held; null where no parabola reaches every measured direction. */
function parabolaChiSquare(full: LeastSquaresProblem, { values }: Solution): number | null {
  const problem = parabolaProblem(full)
  const start = Float64Array.of(values[0]!, atan2(values[2]!, values[1]!), ...values.subarray(PLANE_NAMES.length))
  if (!isInsideDomain(problem, start)) return null
  return solveLeastSquares(problem, start).chiSquare
}

interface Solved {
  /** The one given first; others fit almost as well. */
  solutions: Solution[]
  problemOf: (points: PlanePoints) => LeastSquaresProblem
  referenceEpochYr: number | null
}

/** Without times the conic alone; with times of three epochs the motion. */
function solve(points: PlanePoints, { start, report }: PlaneRequest): Solved {
  const conicOf = ({ used, diameterScale }: PlanePoints) => planeProblem(used, diameterScale)
  const conic = solveLeastSquares(conicOf(points), startOf(points, start))
  if (!hasMotion(points.used)) return { solutions: [conic], problemOf: conicOf, referenceEpochYr: null }
  const isRefit = start !== undefined && start.state.values.length > PLANE_NAMES.length
  const referenceEpochYr = isRefit ? start.state.referenceEpochYr : middleEpoch(points.used)
  const solutions = solvePlaneMotion({ points, conic: conic.values, start, referenceEpochYr, report })
  if (solutions.length === 0) refuse('no-orbit-found', 'No motion about this focus passes near these places at their times.', 'Check times and directions, or leave the times out to fit the shape alone.')
  return { solutions, problemOf: ({ used, diameterScale }) => planeMotionProblem(used, diameterScale, referenceEpochYr), referenceEpochYr }
}

/**
 * Fits a conic in its plane.
 * @param request with checked list and settings.
 * @returns the whole result.
 * @throws RefusedRequest where values are out of range or the measures do not suffice.
 */
export function fitPlane(request: PlaneRequest): FitResult {
  const { measures, settings, report } = request
  validatePlane(measures)
  const prepared = preparePlanePoints(measures, settings)
  checkEnough(prepared, settings)
  const held = heldOfPlane(settings)
  const isHeld = Object.keys(held).length > 0
  if (isHeld && hasMotion(prepared.used)) refuse('setting-not-available', 'Elements are held, and classes of conics asked for, in fits without times only.', 'Leave the times out to hold elements of the shape.')
  report('reading', 1)
  const { solutions: freely, problemOf, referenceEpochYr } = solve(prepared, request)
  const found = isHeld ? [solveHeldPlane(prepared, problemOf(prepared), held, freely[0]!.values)] : freely
  report('polishing', 1)
  const [first] = found as [Solution]
  const degrees = first.residuals.length - planeCovariance(first, held).free
  const factor = degrees > 0 ? Math.sqrt(first.chiSquare / degrees) : 0
  const isEstimated = prepared.basis === 'scaled' && factor > 1e-9
  const points = isEstimated ? rescalePlanePoints(prepared, factor) : prepared
  const problem = problemOf(points)
  const [solution, ...others] = isEstimated ? found.map(({ values }) => (isHeld ? solveHeldPlane(points, problem, held, values) : solveLeastSquares(problem, values))) : found
  if (!(hypot(solution!.values[1]!, solution!.values[2]!) < 1e6)) refuse('no-orbit-found', 'The distances fit no conic about this focus.', 'Check units and directions of the measures.')
  if (settings.conicClass === 'ellipse' && !(hypot(solution!.values[1]!, solution!.values[2]!) < 1)) {
    refuse('no-orbit-found', 'An ellipse was asked for, but the measures fit an unbound conic best: among ellipses there is no best one.', 'Ask for a parabola, or for any conic.')
  }
  const result = judgePlane({ points, solution: solution!, others, held, settings, referenceEpochYr, parabolaChiSquare: isHeld ? null : parabolaChiSquare(problem, solution!) })
  report('judging', 1)
  return result
}
