/**
 * The residual of one direction, with its influence.
 * Along and across are components by the apparent motion among the stars; sunward is the component towards the Sun on the sky, which for a comet
 * shows where the light is centred.
 * Source: influence as influence.ts; the rest by definition.
 */
import { cross, dot, eccentricityVector, lengthOf, type Vector } from '../conic/state'
import { moveInto } from '../conic/universal'
import { asin, atan2, RAD } from '../elementary'
import { withinTurn } from '../conic/thiele-innes'
import { SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import { stateOfValues, type EquatorialOrbit } from '../models/equatorial-orbit'
import { emptyLineOfSight, lineOfSightInto, lineRate, roughLightTime, type LineOfSight } from '../models/line-of-sight'
import { sightProblem } from '../models/sight-rows'
import { ARCSEC_RAD, type Sighting, type SkyMotion } from '../models/sighting'
import type { Residual, SightReference } from '../types'
import { influenceOf } from './influence'

export interface SightResidualContext {
  orbit: EquatorialOrbit
  values: ArrayLike<number>
  covariance: number[][] | null
  scaleSquared: number | null
}

/** Coordinates whose scatter is reported. */
export const SIGHT_UNITS = { raCosDecArcsec: 'arcsec', decArcsec: 'arcsec', alongArcsec: 'arcsec', acrossArcsec: 'arcsec', sunwardArcsec: 'arcsec' } as const

/** Below this sine between line of sight and orbit plane a measure is not carried back onto the orbit. */
const EDGE_ON_BELOW = 0.05

const vectorOf = (a: ArrayLike<number>, from = 0): Vector => [a[from]!, a[from + 1]!, a[from + 2]!]

const earth = new Float64Array(6)

/**
 * Motion of a line of sight on the sky, the observer taken to go with the Earth's centre, and that along its osculating conic from the reference:
 * within 0.05 % of its velocity, and at a thirtieth of the cost of the series.
 * @param sighting whose axes are used.
 * @param found its line of sight.
 * @param reference with the Earth's state.
 * @returns rad/d, east and north.
 */
export function skyMotionOf(sighting: Sighting, found: LineOfSight, reference: SightReference): SkyMotion {
  moveInto(reference.earth, MU, sighting.jdTt - reference.jdTt, earth)
  const rate = lineRate(sighting.sunVelocity, found, earth.subarray(3))
  return [dot(rate, vectorOf(sighting.axes, 3)) / found.distance, dot(rate, vectorOf(sighting.axes, 6)) / found.distance]
}

/** O−C east and north, rad: the observed direction about the computed one. */
function differenceOf(sighting: Sighting, found: LineOfSight): { east: number; north: number } {
  const [d, u] = [vectorOf(found.line), vectorOf(sighting.axes)]
  const size = found.distance + dot(d, u)
  const scale = size > 1e-9 * found.distance ? -2 / size : -2e9 / found.distance
  return { east: scale * dot(d, vectorOf(sighting.axes, 3)), north: scale * dot(d, vectorOf(sighting.axes, 6)) }
}

/** Components of O−C along and across a direction on the tangent plane; null where it has none. */
function componentsBy(difference: { east: number; north: number }, east: number, north: number): { along: number | null; across: number | null } {
  const length = Math.sqrt(east * east + north * north)
  if (!(length > 1e-12)) return { along: null, across: null }
  return {
    along: (difference.east * east + difference.north * north) / length / ARCSEC_RAD,
    across: (difference.north * east - difference.east * north) / length / ARCSEC_RAD,
  }
}

/** Where the measured line of sight meets the plane of the orbit. */
function onOrbitPlane(sighting: Sighting, state: ArrayLike<number>): Residual['inOrbitPlane'] {
  const [place, velocity, u, observer] = [vectorOf(state), vectorOf(state, 3), vectorOf(sighting.axes), vectorOf(sighting.observer)]
  const h = cross(place, velocity)
  const slope = dot(u, h) / lengthOf(h)
  if (!(Math.abs(slope) > EDGE_ON_BELOW)) return null
  const rho = -dot(observer, h) / lengthOf(h) / slope
  if (!(rho > 0)) return null
  const there: Vector = [0, 1, 2].map((k) => observer[k]! + rho * u[k]!) as unknown as Vector
  const e = eccentricityVector({ place, velocity }, MU)
  const from = lengthOf(e) > 1e-11 ? e : place
  return { trueAnomalyDeg: atan2(dot(cross(from, there), h) / lengthOf(h), dot(from, there)) * RAD, radius: lengthOf(there) }
}

/** What all measures are compared with, computed once. */
interface Comparison {
  rows: Float64Array
  jacobian: Float64Array
  /** Lines of sight; null where the orbit cannot be followed. */
  lines: (LineOfSight | null)[]
}

function compare(sightings: readonly Sighting[], { orbit, values }: SightResidualContext): Comparison {
  const problem = sightProblem(sightings, orbit.map, orbit.motion)
  const rows = new Float64Array(problem.rows).fill(NaN)
  const jacobian = new Float64Array(problem.rows * problem.parameters)
  const isFollowed = problem.evaluate(Float64Array.from(values), rows, jacobian)
  const state = stateOfValues(orbit, values)
  orbit.motion.begin(state, false)
  const lines = sightings.map((sighting) => {
    const found = emptyLineOfSight()
    return isFollowed && lineOfSightInto(sighting, orbit.motion, roughLightTime(sighting, state), found, false) ? found : null
  })
  return { rows, jacobian, lines }
}

/** Coordinates of one measure. */
function coordinatesOf(sighting: Sighting, found: LineOfSight, reference: SightReference): Pick<Residual, 'computed' | 'observedMinusComputed' | 'inOrbitPlane'> {
  const line = vectorOf(found.line)
  const [observer, east, north] = [vectorOf(sighting.observer), vectorOf(sighting.axes, 3), vectorOf(sighting.axes, 6)]
  const difference = differenceOf(sighting, found)
  const motion = skyMotionOf(sighting, found, reference)
  const byMotion = componentsBy(difference, motion[0], motion[1])
  return {
    computed: {
      raDeg: withinTurn(atan2(line[1], line[0])) * RAD,
      decDeg: asin(Math.max(-1, Math.min(1, line[2] / found.distance))) * RAD,
      distanceAu: found.distance, sunDistanceAu: lengthOf(vectorOf(found.state)),
    },
    observedMinusComputed: {
      raCosDecArcsec: difference.east / ARCSEC_RAD, decArcsec: difference.north / ARCSEC_RAD,
      alongArcsec: byMotion.along, acrossArcsec: byMotion.across,
      sunwardArcsec: componentsBy(difference, -dot(observer, east), -dot(observer, north)).along,
    },
    inOrbitPlane: onOrbitPlane(sighting, found.state),
  }
}

/**
 * The residuals of all measures.
 * @param sightings with their errors.
 * @param context orbit and solution.
 * @returns one a sighting; without coordinates where the orbit cannot be followed to its time.
 * Source: definition; Cook & Weisberg 1982 for the influence.
 */
export function sightResiduals(sightings: readonly Sighting[], context: SightResidualContext): Residual[] {
  const { covariance, scaleSquared, orbit } = context
  const p = orbit.map.parameters
  const { rows, jacobian, lines } = compare(sightings, context)
  return sightings.map((sighting, i) => {
    const base = { id: sighting.id, status: sighting.status, weight: sighting.status === 'used' ? sighting.weight : 0 }
    const found = lines[i]!
    if (found === null) return { ...base, computed: {}, observedMinusComputed: {}, normalised: null, rows: [], leverage: null, cook: null, inOrbitPlane: null }
    const own = rows.subarray(2 * i, 2 * i + 2)
    const gradients = [jacobian.subarray(2 * i * p, (2 * i + 1) * p), jacobian.subarray((2 * i + 1) * p, (2 * i + 2) * p)]
    const influence = sighting.status === 'used' && covariance !== null ? influenceOf({ residuals: own, gradients }, covariance, scaleSquared) : null
    return {
      ...base, ...coordinatesOf(sighting, found, orbit.reference),
      normalised: Math.sqrt(own[0]! * own[0]! + own[1]! * own[1]!), rows: Array.from(own),
      leverage: influence?.leverage ?? null, cook: influence?.cook ?? null,
    }
  })
}
