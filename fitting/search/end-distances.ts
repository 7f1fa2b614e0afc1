/**
 * Orbits through the first and the last line of sight for every pair of distances there.
 *
 * Symbols: ρ₁, ρₙ distances at the ends, T the time between, V the largest change of distance a day that is looked at. ρ₁ runs over 24 values,
 * evenly in its logarithm; ρₙ over 24 values from ρ₁ − VT to ρ₁ + VT, or, where that is more than the whole range, over the same 24. Between
 * the ends the conic of Lambert's problem, the short and the long way; the measures between give χ², and its local minima are returned.
 *
 * Source: the idea after Gooding 1997, A new procedure for the solution of the classical problem of minimal orbit determination from three
 * lines of sight, Celestial Mechanics and Dynamical Astronomy 66, 387, and Virtanen, Muinonen & Bowell 2001, Icarus 154, 412.
 */
import { LIGHT_AU_PER_D, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth/constants'
import { exp, log } from '../elementary'
import { emptyLineOfSight, lineOfSightInto, roughLightTime, sunMotion } from '../models/line-of-sight'
import type { Sight } from '../models/sight-rows'
import { joinInto } from './lambert'

const STEPS = 24
/** With one measure between the ends every exact orbit is wanted, however narrow its valley. */
const STEPS_FOR_THREE = 60
const NEAREST_AU = 0.003
const FARTHEST_AU = 60
/** V, au/d: 104 km/s. */
const LARGEST_RATE_AU_PER_D = 0.06
/** Pairs within this factor in speed of no body's: see sight-frame. */
const LARGEST_EXCESS_SQUARED = 0.01

export interface Candidate {
  /** Heliocentric state, au and au/d, and its time. */
  state: Float64Array
  jdTt: number
  chiSquare: number
}

const found = emptyLineOfSight()

/** χ² of a heliocentric state, Infinity where it cannot be followed. */
export function chiSquareOf(state: Float64Array, jdTt: number, sights: readonly Sight[], bound: number): number {
  const motion = sunMotion(jdTt)
  motion.begin(state, false)
  let sum = 0
  for (const sight of sights) {
    if (!lineOfSightInto(sight, motion, roughLightTime(sight, state), found, false)) return Infinity
    const { axes, whitening: w } = sight
    const d = found.line
    const size = Math.max(found.distance + d[0]! * axes[0]! + d[1]! * axes[1]! + d[2]! * axes[2]!, 1e-12 * found.distance)
    const x = 2 * (d[0]! * axes[3]! + d[1]! * axes[4]! + d[2]! * axes[5]!) / size
    const y = 2 * (d[0]! * axes[6]! + d[1]! * axes[7]! + d[2]! * axes[8]!) / size
    const across = w[1]! * x + w[2]! * y
    sum += w[0]! * w[0]! * x * x + across * across
    if (sum > bound) return Infinity
  }
  return sum
}

function placeAt(sight: Sight, distance: number, out: Float64Array): void {
  const tau = distance / LIGHT_AU_PER_D
  for (let k = 0; k < 3; k++) out[k] = sight.observer[k]! + sight.sunVelocity[k]! * tau + distance * sight.axes[k]!
}

function firstDistance(i: number, steps: number): number {
  return NEAREST_AU * exp((i * log(FARTHEST_AU / NEAREST_AU)) / (steps - 1))
}

function lastDistance(rho: number, part: number, days: number): number {
  const reach = LARGEST_RATE_AU_PER_D * days
  const low = Math.max(NEAREST_AU, rho - reach)
  const high = Math.min(FARTHEST_AU, rho + reach)
  return reach > 0.5 * rho ? low * exp(part * log(high / low)) : low + (high - low) * part
}

const from = new Float64Array(3)
const to = new Float64Array(3)
const velocities = new Float64Array(6)

/** The candidate of one pair of distances; χ² Infinity where there is none. */
function candidateAt(ends: readonly [Sight, Sight], distances: readonly [number, number], isLongWay: boolean, between: readonly Sight[]): Candidate {
  const [first, last] = ends
  placeAt(first, distances[0], from)
  placeAt(last, distances[1], to)
  const leftAt = first.jdTt - distances[0] / LIGHT_AU_PER_D
  const elapsed = last.jdTt - distances[1] / LIGHT_AU_PER_D - leftAt
  const none = { state: new Float64Array(0), jdTt: leftAt, chiSquare: Infinity }
  if (!joinInto(from, to, elapsed, { mu: MU, isLongWay }, velocities)) return none
  const r = Math.sqrt(from[0]! * from[0]! + from[1]! * from[1]! + from[2]! * from[2]!)
  const speedSquared = velocities[0]! * velocities[0]! + velocities[1]! * velocities[1]! + velocities[2]! * velocities[2]!
  if (speedSquared - 2 * MU / r > LARGEST_EXCESS_SQUARED) return none
  const state = Float64Array.of(from[0]!, from[1]!, from[2]!, velocities[0]!, velocities[1]!, velocities[2]!)
  return { state, jdTt: leftAt, chiSquare: chiSquareOf(state, leftAt, between, Infinity) }
}

/** Local minima of a square table among their eight neighbours. */
function minimaOf(table: readonly Candidate[], steps: number): Candidate[] {
  return table.filter((candidate, at) => {
    if (!(candidate.chiSquare < Infinity)) return false
    const [i, j] = [Math.floor(at / steps), at % steps]
    for (let di = -1; di <= 1; di++) {
      for (let dj = -1; dj <= 1; dj++) {
        const [k, l] = [i + di, j + dj]
        if (k >= 0 && l >= 0 && k < steps && l < steps && table[k * steps + l]!.chiSquare < candidate.chiSquare) return false
      }
    }
    return true
  })
}

/**
 * Local minima of χ² over the two end distances.
 * @param sights in order of time, at least three, the first and the last at different times.
 * @param most how many to return.
 * @returns candidates, best first.
 * Source: after Gooding 1997, Celestial Mechanics and Dynamical Astronomy 66, 387; Virtanen, Muinonen & Bowell 2001, Icarus 154, 412.
 */
export function searchEndDistances(sights: readonly Sight[], most: number): Candidate[] {
  const ends = [sights[0]!, sights[sights.length - 1]!] as const
  const between = sights.slice(1, -1)
  const days = ends[1].jdTt - ends[0].jdTt
  const steps = between.length === 1 ? STEPS_FOR_THREE : STEPS
  const found: Candidate[] = []
  for (const isLongWay of [false, true]) {
    const table: Candidate[] = []
    for (let i = 0; i < steps; i++) {
      const rho = firstDistance(i, steps)
      for (let j = 0; j < steps; j++) table.push(candidateAt(ends, [rho, lastDistance(rho, j / (steps - 1), days)], isLongWay, between))
    }
    found.push(...minimaOf(table, steps))
  }
  return found.sort((a, b) => a.chiSquare - b.chiSquare).slice(0, most)
}
