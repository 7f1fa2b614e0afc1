/**
 * From states near the truth to settled orbits: parameters about the final reference, forces, parabola held or not; and arcs too long
 * for one search, grown from their densest part.
 */
import { moveInto } from '../conic/universal'
import { earthHeliocentric, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import { equatorialOrbit, stateOfValues, type EquatorialOrbit, type Forces } from '../models/equatorial-orbit'
import { parabolaNear, sightOfState } from '../models/sight-frame'
import { sightProblem, type Sight } from '../models/sight-rows'
import { isInsideDomain } from '../solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../solve/levenberg-marquardt'
import type { SightReference } from '../types'
import { isSameOrbit, searchFirstOrbits } from './first-orbit'

/** Arcs up to this are searched as a whole, d. */
export const WHOLE_ARC_DAYS = 130
/** Epochs of longer arcs than this are rounded to 0h TT. */
const ROUND_EPOCH_BEYOND_DAYS = 2
/** How many orbits of a part of the arc are followed to the whole. */
const FOLLOWED = 4
/** Beyond this scatter, in σ squared, of the best orbit of a short arc, the measures belong to no one body: nothing is followed further. */
const HOPELESS_ABOVE = 1e8
/** An integrated year costs milliseconds a step of the solver: so many steps in all years together, but no fewer than the least. */
const INTEGRATED_YEARS = 60
const LEAST_STEPS = 8
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

/** The sights within so many days of a date. */
function within(sights: readonly Sight[], middleJdTt: number, days: number): Sight[] {
  return sights.filter((sight) => Math.abs(sight.jdTt - middleJdTt) <= days / 2)
}

/** The middle of the part of the arc, no longer than one search, that holds the most sights, and of those the longest. */
function densestMiddle(sights: readonly Sight[]): number {
  let best = { count: 0, span: 0, middle: 0 }
  for (let i = 0, j = 0; i < sights.length; i++) {
    while (j + 1 < sights.length && sights[j + 1]!.jdTt - sights[i]!.jdTt <= WHOLE_ARC_DAYS) j++
    const [count, span] = [j - i + 1, sights[j]!.jdTt - sights[i]!.jdTt]
    if (count > best.count || (count === best.count && span > best.span)) best = { count, span, middle: (sights[i]!.jdTt + sights[j]!.jdTt) / 2 }
  }
  return best.middle
}

/**
 * States of first orbits. Arcs beyond 130 days are searched in their densest part and followed to the whole, the part doubled each time.
 * @param sights used, in order of time.
 * @param forces by which long arcs are followed.
 * @param onProgress part done, 0 … 1.
 * @returns states, best first; none where no orbit was found; `isHopeless` where even a short part of the arc fits no orbit at all.
 */
export function firstStates(sights: readonly Sight[], forces: Forces, onProgress: (part: number) => void): { states: DatedState[]; isHopeless: boolean } {
  const span = sights[sights.length - 1]!.jdTt - sights[0]!.jdTt
  const isWhole = span <= WHOLE_ARC_DAYS
  const middle = isWhole ? 0 : densestMiddle(sights)
  let part = isWhole ? [...sights] : within(sights, middle, WHOLE_ARC_DAYS)
  if (part.length < 3) part = [...sights]
  const reference = middleReference(part)
  const orbit = equatorialOrbit(reference, 'sun')
  const solutions = searchFirstOrbits(part, reference, onProgress)
  let states = solutions.map((solution): DatedState => ({ state: stateOfValues(orbit, solution.values), jdTt: reference.jdTt }))
  if (solutions.length > 0 && solutions[0]!.chiSquare > HOPELESS_ABOVE * solutions[0]!.residuals.length) return { states, isHopeless: true }
  for (let days = 2 * WHOLE_ARC_DAYS; part.length < sights.length && states.length > 0; days *= 2) {
    const wider = within(sights, middle, days)
    if (wider.length === part.length) continue
    part = wider
    states = settleSights(part, states.slice(0, days > LONG_ARC_DAYS ? 2 : FOLLOWED), middleReference(part), { forces, isParabola: false }).map(stateOf)
  }
  return { states, isHopeless: false }
}
