/** The orbit of a comet or minor planet from request to result: observers, search or refit, solution, judgement. */
import { lengthOf } from '../conic/state'
import { SUN_GRAVITATION_AU3_PER_D2 as MU, SUN_OVER_PLANET_MASS } from '../earth'
import { orbitOfState, stateOfValues, type Forces } from '../models/equatorial-orbit'
import { emptyLineOfSight, lineOfSightInto, roughLightTime } from '../models/line-of-sight'
import { prepareSightings, rescaleSightings, whiten, type Sightings } from '../models/sighting'
import { firstStates, WHOLE_ARC_DAYS } from '../search/long-arcs'
import { middleReference, settleSights, stateOf, type DatedState, type SettledSights, type SettleOptions } from '../search/settle-sights'
import type { EquatorialMeasure, FitResult, FitSettings, FitStart } from '../types'
import { defaultForces } from '../uncertainty/honest-arc'
import { skyMotionOf } from '../uncertainty/sight-residuals'
import { judgeEquatorial } from './judge-equatorial'
import type { Report } from './progress'
import { refuse } from './refusal'
import { validateEquatorial } from './validate-equatorial'

export interface EquatorialRequest {
  measures: EquatorialMeasure[]
  settings: FitSettings
  start?: FitStart
  report: Report
}

const LEAST_MEASURES = 3
/** Times closer than this are one (0.1 s). */
const SAME_TIME_DAYS = 1e-6
const NOISE_FREE = 1e-9
/** Orbits that are followed from the search to the end. */
const FOLLOWED = 9
/** The errors of the clock follow the motion of the orbit, which hardly moves with them: so many passes. */
const CLOCK_PASSES = 2
const EARTH_GRAVITATION = MU / SUN_OVER_PLANET_MASS['earth-moon']

function checkEnough({ used }: Sightings): void {
  if (used.length < LEAST_MEASURES) {
    refuse('too-few-measures', `An orbit about the Sun has 6 unknowns; ${used.length} directions are used.`, 'Use at least three measures of three times, better of three nights.')
  }
  const times = used.filter((sighting, i) => i === 0 || sighting.jdUtc - used[i - 1]!.jdUtc > SAME_TIME_DAYS).length
  if (times === 1) refuse('one-epoch', 'All used measures are of one time: nothing shows the motion.', 'Add measures of other nights.')
  if (times < LEAST_MEASURES) refuse('too-few-measures', `The used measures are of ${times} times; an orbit needs three.`, 'Add measures of other nights.')
}

/** The state to refit from. */
function startState({ state }: FitStart): DatedState {
  const orbit = orbitOfState(state)
  return { state: stateOfValues(orbit, state.values), jdTt: orbit.reference.jdTt }
}

/** Smallest distance from the observer over the used measures, au. */
export function nearestDistance({ orbit, solution }: SettledSights, { used }: Sightings): number {
  const state = stateOfValues(orbit, solution.values)
  orbit.motion.begin(state, false)
  const found = emptyLineOfSight()
  return used.reduce((least, sighting) => (lineOfSightInto(sighting, orbit.motion, roughLightTime(sighting, state), found, false) ? Math.min(least, found.distance) : least), Infinity)
}

/** Lets the error of each clock act along the motion of this orbit. */
function whitenByMotion({ orbit, solution }: SettledSights, { all }: Sightings): void {
  const state = stateOfValues(orbit, solution.values)
  orbit.motion.begin(state, false)
  const found = emptyLineOfSight()
  for (const sighting of all) {
    if (!(sighting.sigmaTimeS > 0) || !lineOfSightInto(sighting, orbit.motion, roughLightTime(sighting, state), found, false)) continue
    whiten(sighting, skyMotionOf(sighting, found, orbit.reference))
  }
}

/** A body bound to the Earth is no body about the Sun. */
function refuseEarthBound(settled: SettledSights): void {
  const { state } = stateOf(settled)
  const { earth } = settled.orbit.reference
  const part = (from: number) => [0, 1, 2].map((k) => state[from + k]! - earth[from + k]!) as unknown as [number, number, number]
  const speed = lengthOf(part(3))
  if (0.5 * speed * speed < EARTH_GRAVITATION / lengthOf(part(0))) {
    refuse('no-orbit-found', `The best orbit keeps the body bound to the Earth, ${lengthOf(part(0)).toFixed(5)} au away: an artificial or temporary satellite, or mistyped times.`, 'Orbits about the Sun only are fitted here. Check times and positions.')
  }
}

/** Settles, sizes equal errors by the residuals, and lets the clocks' errors act; as often as that asks for. */
function withFinalErrors(sightings: Sightings, provisional: SettledSights[], options: SettleOptions): SettledSights[] {
  const reference = middleReference(sightings.used)
  let settled = provisional
  if (settled.length === 0) return settled
  const degrees = 2 * sightings.used.length - settled[0]!.orbit.map.parameters
  const factor = degrees > 0 ? Math.sqrt(settled[0]!.solution.chiSquare / degrees) : 0
  const isRescaled = sightings.basis === 'scaled' && factor > NOISE_FREE
  if (isRescaled) rescaleSightings(sightings, factor)
  const passes = sightings.all.some((sighting) => sighting.sigmaTimeS > 0) ? CLOCK_PASSES : isRescaled ? 1 : 0
  for (let pass = 0; pass < passes; pass++) {
    whitenByMotion(settled[0]!, sightings)
    settled = settleSights(sightings.used, settled.map(stateOf), reference, options)
  }
  return settled
}

/** Forces where none are asked for: no planets where the measures fit no orbit anyway. */
function forcesOf(sunSettled: SettledSights[], sightings: Sightings, days: number, isHopeless: boolean): Forces {
  if (isHopeless) return 'sun'
  return defaultForces(days, sunSettled.length > 0 ? nearestDistance(sunSettled[0]!, sightings) : Infinity)
}

/** χ² with e = 1 held, from the nearest parabola; null where there is none. */
function parabolaChiSquare(best: SettledSights, sightings: Sightings, forces: Forces): number | null {
  const [parabola] = settleSights(sightings.used, [stateOf(best)], middleReference(sightings.used), { forces, isParabola: true })
  return parabola ? parabola.solution.chiSquare : null
}

/**
 * Fits the orbit of a comet or minor planet.
 * @param request with checked list and settings.
 * @returns the whole result.
 * @throws RefusedRequest where values are out of range, the measures do not suffice, or the body is bound to the Earth.
 */
export function fitEquatorial(request: EquatorialRequest): FitResult {
  const { measures, settings, start, report } = request
  validateEquatorial(measures)
  const sightings = prepareSightings(measures, settings)
  checkEnough(sightings)
  report('reading', 1)
  const { used } = sightings
  const days = used[used.length - 1]!.jdTt - used[0]!.jdTt
  const followForces = settings.forces ?? defaultForces(days, Infinity)
  const first = start ? { states: [startState(start)], isHopeless: false } : firstStates(used, followForces, (part) => report('searching', part))
  const states = first.states.slice(0, used.length === LEAST_MEASURES ? undefined : FOLLOWED)
  const isParabola = settings.conicClass === 'parabola'
  const sunSettled = settleSights(used, states, middleReference(used), { forces: 'sun', isParabola: false })
  const forces = settings.forces ?? forcesOf(sunSettled, sightings, days, first.isHopeless)
  report('polishing', 0.3)
  // Over a long arc the planets' pull would lead the Sun's conic astray: there the states of the search are better starts.
  const isNear = sunSettled.length > 0 && (forces === 'sun' || days <= WHOLE_ARC_DAYS)
  const options: SettleOptions = { forces, isParabola }
  const provisional = isNear && forces === 'sun' && !isParabola ? sunSettled
    : settleSights(used, isNear ? sunSettled.map(stateOf) : states, middleReference(used), options)
  const settled = withFinalErrors(sightings, provisional, options)
  if (settled.length === 0) refuse('no-orbit-found', 'No orbit about the Sun passes near these directions.', 'Check times, positions and stations; leave doubtful measures out.')
  refuseEarthBound(settled[0]!)
  report('polishing', 1)
  const result = judgeEquatorial({
    settled, sightings, settings, forces, days, nearestAu: nearestDistance(settled[0]!, sightings),
    parabolaChiSquare: () => parabolaChiSquare(settled[0]!, sightings, forces),
  })
  report('judging', 1)
  return result
}
