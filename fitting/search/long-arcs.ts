/**
 * First orbits of any arc. Up to 130 days the arc is searched as a whole. A longer one is searched in the part of 130 days that holds most
 * measures, and that orbit is followed outwards, the part doubled each time; where it goes astray the next densest parts are tried.
 */
import { equatorialOrbit, stateOfValues, type Forces } from '../models/equatorial-orbit'
import type { Sight } from '../models/sight-rows'
import { searchFirstOrbits } from './first-orbit'
import { middleReference, settleSights, stateOf, type DatedState } from './settle-sights'

/** Arcs up to this are searched as a whole, d. */
export const WHOLE_ARC_DAYS = 130
/** Parts that are tried, and how many orbits of each are followed. */
const PARTS = 3
const FOLLOWED = 4
/** Arcs longer than this are followed with the best orbit and one more only, d. */
const LONG_ARC_DAYS = 700
/** χ² a row: beyond the first the measures of a short part belong to no one body; beyond the second an orbit has gone astray; below the third it is right. */
const HOPELESS_ABOVE = 1e8
const ASTRAY_ABOVE = 1e6
const RIGHT_BELOW = 25

export interface FirstStates {
  /** Best first; none where no orbit was found. */
  states: DatedState[]
  /** Even a short part of the arc fits no orbit at all. */
  isHopeless: boolean
}

interface Followed extends FirstStates {
  /** χ² a row of the whole arc; Infinity where it was not reached. */
  scatter: number
}

/** The sights within so many days of a date. */
function within(sights: readonly Sight[], middleJdTt: number, days: number): Sight[] {
  return sights.filter((sight) => Math.abs(sight.jdTt - middleJdTt) <= days / 2)
}

/** Middles of the parts, no longer than one search and no closer to each other, that hold the most sights, and of those the longest. */
function densestMiddles(sights: readonly Sight[]): number[] {
  const parts: { count: number; span: number; middle: number }[] = []
  for (let i = 0, j = 0; i < sights.length; i++) {
    while (j + 1 < sights.length && sights[j + 1]!.jdTt - sights[i]!.jdTt <= WHOLE_ARC_DAYS) j++
    parts.push({ count: j - i + 1, span: sights[j]!.jdTt - sights[i]!.jdTt, middle: (sights[i]!.jdTt + sights[j]!.jdTt) / 2 })
  }
  parts.sort((a, b) => b.count - a.count || b.span - a.span || a.middle - b.middle)
  const kept: number[] = []
  for (const { middle } of parts) if (kept.length < PARTS && kept.every((other) => Math.abs(other - middle) > WHOLE_ARC_DAYS)) kept.push(middle)
  return kept
}

/** Orbits of one part, followed to the whole arc. */
function followFrom(sights: readonly Sight[], first: readonly Sight[], middleJdTt: number, forces: Forces): Followed {
  let part = first
  const reference = middleReference(part)
  const orbit = equatorialOrbit(reference, 'sun')
  const solutions = searchFirstOrbits(part, reference)
  let states = solutions.map((solution): DatedState => ({ state: stateOfValues(orbit, solution.values), jdTt: reference.jdTt }))
  let scatter = solutions.length > 0 ? solutions[0]!.chiSquare / solutions[0]!.residuals.length : Infinity
  if (scatter > HOPELESS_ABOVE) return { states, isHopeless: states.length > 0, scatter }
  for (let days = 2 * WHOLE_ARC_DAYS; part.length < sights.length && scatter <= ASTRAY_ABOVE; days *= 2) {
    const wider = within(sights, middleJdTt, days)
    if (wider.length === part.length) continue
    part = wider
    const settled = settleSights(part, states.slice(0, days > LONG_ARC_DAYS ? 2 : FOLLOWED), middleReference(part), { forces, isParabola: false })
    if (settled.length === 0) return { states, isHopeless: false, scatter: Infinity }
    states = settled.map(stateOf)
    scatter = settled[0]!.solution.chiSquare / (2 * part.length)
  }
  return { states, isHopeless: false, scatter }
}

/**
 * States of first orbits.
 * @param sights used, in order of time.
 * @param forces by which long arcs are followed.
 * @param onProgress part done, 0 … 1.
 * @returns states, best first.
 */
export function firstStates(sights: readonly Sight[], forces: Forces, onProgress: (part: number) => void): FirstStates {
  const isWhole = sights[sights.length - 1]!.jdTt - sights[0]!.jdTt <= WHOLE_ARC_DAYS
  let best: Followed | null = null
  const middles = isWhole ? [0] : densestMiddles(sights)
  for (const [i, middle] of middles.entries()) {
    const part = isWhole ? sights : within(sights, middle, WHOLE_ARC_DAYS)
    const followed = followFrom(sights, part.length < 3 ? sights : part, middle, forces)
    if (best === null || followed.scatter < best.scatter) best = followed
    onProgress((i + 1) / middles.length)
    if (followed.isHopeless || best.scatter <= RIGHT_BELOW) break
  }
  return best ?? { states: [], isHopeless: false }
}
