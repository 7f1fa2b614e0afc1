/** From states near the truth to settled orbits: parameters about the final reference, forces, parabola held or not. */
import { moveInto } from '../conic/universal'
import { earthHeliocentric, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import { equatorialOrbit, stateOfValues, type EquatorialOrbit, type Forces } from '../models/equatorial-orbit'
import { parabolaNear, sightOfState } from '../models/sight-frame'
import { sightProblem, type Sight } from '../models/sight-rows'
import { isInsideDomain } from '../solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'
import type { SightReference } from '../types'
import { isSameOrbit } from './first-orbit'

/** Epochs of longer arcs than this are rounded to 0h TT. */
const ROUND_EPOCH_BEYOND_DAYS = 2
/** With the planets so many orbits are followed. */
const FOLLOWED = 4
/** An integrated year costs milliseconds a step of the solver: so many steps in all years together, but no fewer than the least. */
const INTEGRATED_YEARS = 120
const LEAST_STEPS = 12
const MOST_STEPS = 200
/** Arcs longer than this are followed with the best orbit and one more only, d. */
const LONG_ARC_DAYS = 700

export interface SettledSights {
  orbit: EquatorialOrbit
  solution: Solution
}

/** A heliocentric state with its time, JD of TT. */
export interface DatedState {
  state: Float64Array
  jdTt: number
}

export interface SettleOptions {
  forces: Forces
  isParabola: boolean
}

/**
 * Line of sight and Earth at the middle of an arc, at 0h TT where the arc is longer than two days.
 * @param sights in order of time.
 * @returns the reference.
 */
export function middleReference(sights: readonly Sight[]): SightReference {
  const [first, last] = [sights[0]!.jdTt, sights[sights.length - 1]!.jdTt]
  const middle = (first + last) / 2
  const jdTt = last - first > ROUND_EPOCH_BEYOND_DAYS ? Math.floor(middle) + 0.5 : middle
  const nearest = sights.reduce((best, sight) => (Math.abs(sight.jdTt - jdTt) < Math.abs(best.jdTt - jdTt) ? sight : best))
  const earth = new Float64Array(6)
  earthHeliocentric(jdTt, earth)
  return { jdTt, earth: Array.from(earth), direction: [nearest.axes[0]!, nearest.axes[1]!, nearest.axes[2]!] }
}

/** The orbit and the parameters that start from a state. */
function startFrom({ state, jdTt }: DatedState, reference: SightReference, options: SettleOptions): { orbit: EquatorialOrbit; values: Float64Array } | null {
  const there = new Float64Array(6)
  if (!moveInto(state, MU, reference.jdTt - jdTt, there)) return null
  if (options.isParabola) {
    const near = parabolaNear(reference, there)
    return { orbit: equatorialOrbit(near.reference, options.forces), values: near.start }
  }
  return { orbit: equatorialOrbit(reference, options.forces), values: sightOfState(reference, there) }
}

/** Steps of the solver that this arc allows. */
function stepsAllowed(sights: readonly Sight[], forces: Forces): number {
  if (forces === 'sun') return MOST_STEPS
  const years = (sights[sights.length - 1]!.jdTt - sights[0]!.jdTt) / 365.25
  return Math.max(LEAST_STEPS, Math.min(MOST_STEPS, Math.floor(INTEGRATED_YEARS / Math.max(years, 0.1))))
}

/** Those of the states that are worth their time. */
function worthFollowing(sights: readonly Sight[], states: readonly DatedState[], forces: Forces): readonly DatedState[] {
  if (forces === 'sun') return states
  return states.slice(0, sights[sights.length - 1]!.jdTt - sights[0]!.jdTt > LONG_ARC_DAYS ? 2 : FOLLOWED)
}

/**
 * Settles orbits on sights from states.
 * @param sights used, in order of time.
 * @param states to start from.
 * @param reference of the parameters.
 * @param options forces, and whether a parabola is held.
 * @returns distinct settled orbits, best first.
 */
export function settleSights(sights: readonly Sight[], states: readonly DatedState[], reference: SightReference, options: SettleOptions): SettledSights[] {
  const settled: SettledSights[] = []
  const maxIterations = stepsAllowed(sights, options.forces)
  for (const dated of worthFollowing(sights, states, options.forces)) {
    const start = startFrom(dated, reference, options)
    if (start === null || !start.values.every((value) => value - value === 0)) continue
    const problem = sightProblem(sights, start.orbit.map, start.orbit.motion)
    if (isInsideDomain(problem, start.values)) settled.push({ orbit: start.orbit, solution: solveLeastSquares(problem, start.values, { maxIterations }) })
  }
  settled.sort((a, b) => a.solution.chiSquare - b.solution.chiSquare)
  return settled.filter((one, i) => settled.slice(0, i).every((other) => !isSameOrbit(stateOf(other).state, stateOf(one).state)))
}

/**
 * The state of a settled orbit at its reference.
 * @param settled orbit and solution.
 * @returns the state and its time.
 */
export function stateOf({ orbit, solution }: SettledSights): DatedState {
  return { state: stateOfValues(orbit, solution.values), jdTt: orbit.reference.jdTt }
}
