/**
 * The state of a body about the Sun in terms of what a short arc determines.
 *
 * Symbols: u₀ unit vector of the reference line of sight, e, n its directions of growing right ascension and declination, R, Ṙ the
 * Earth's heliocentric state at the reference epoch, w = u₀ + ξe + ηn, ρ the distance along u₀:
 *   r = R + ρw,  v = Ṙ + ρ(ρ̇/ρ·w + ξ̇e + η̇n)
 * Parameters (ξ, η, ξ̇, η̇, ln ρ, ρ̇/ρ); rad, rad/d, ln au, 1/d. For a held parabola (ξ, η, ln ρ, a, b): v = √(2μ/r)·m/|m| with
 * m = m₀ + a·m₁ + b·m₂, m₀ a reference direction of motion and m₁, m₂ square to it.
 *
 * Source: after Bernstein & Khushalani 2000, Orbit fitting and uncertainties for Kuiper Belt objects, AJ 120, 3323.
 */
import { exp, hypot, log } from '../elementary'
import type { Vector } from '../conic/state'
import { cross, dot, lengthOf } from '../conic/state'
import type { SightReference } from '../types'
import { SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth/constants'

export const EQUATORIAL_NAMES = ['xi', 'eta', 'xiDot', 'etaDot', 'lnDistance', 'distanceRate'] as const
export const PARABOLA_NAMES = ['xi', 'eta', 'lnDistance', 'motionA', 'motionB'] as const

/** Distances along the line of sight outside e^±LARGEST_LN_DISTANCE au are no orbit. */
export const LARGEST_LN_DISTANCE = 9.5
/** Speed far from the Sun that no body exceeds here, au/d (170 km/s). */
const LARGEST_EXCESS_AU_PER_D = 0.1

/** From parameters to a heliocentric state (au, au/d, ICRS) with its derivatives. */
export interface StateMap {
  names: readonly string[]
  parameters: number
  /** Fills the state and, where asked, the row-major 6 × parameters derivatives; false outside the domain. */
  stateInto(values: ArrayLike<number>, state: Float64Array, partials: Float64Array | null): boolean
}

/**
 * Directions of growing right ascension and declination.
 * @param u unit vector on equatorial axes.
 * @returns unit vectors east and north; at the poles those of right ascension 0.
 * Source: definition.
 */
export function tangentsOf(u: Vector): { east: Vector; north: Vector } {
  const level = hypot(u[0], u[1])
  const east: Vector = level > 1e-12 ? [-u[1] / level, u[0] / level, 0] : [0, 1, 0]
  return { east, north: cross(u, east) }
}

/** True where a state is one that a body about the Sun can have. */
function isPossible(state: Float64Array): boolean {
  const r = Math.sqrt(state[0]! * state[0]! + state[1]! * state[1]! + state[2]! * state[2]!)
  const speedSquared = state[3]! * state[3]! + state[4]! * state[4]! + state[5]! * state[5]!
  return r > 0 && speedSquared - 2 * MU / r <= LARGEST_EXCESS_AU_PER_D * LARGEST_EXCESS_AU_PER_D
}

/**
 * The map of the six parameters.
 * @param reference line of sight and the Earth at the epoch.
 * @returns the map from (ξ, η, ξ̇, η̇, ln ρ, ρ̇/ρ).
 * Source: after Bernstein & Khushalani 2000, AJ 120, 3323.
 */
export function sightMap(reference: SightReference): StateMap {
  const { earth, direction: u } = reference
  const { east, north } = tangentsOf(u)
  return {
    names: EQUATORIAL_NAMES,
    parameters: 6,
    stateInto(values, state, partials) {
      if (!(Math.abs(values[4]!) <= LARGEST_LN_DISTANCE)) return false
      const rho = exp(values[4]!)
      if (partials) partials.fill(0)
      for (let i = 0; i < 3; i++) {
        const w = u[i]! + values[0]! * east[i]! + values[1]! * north[i]!
        const rate = values[5]! * w + values[2]! * east[i]! + values[3]! * north[i]!
        state[i] = earth[i]! + rho * w
        state[i + 3] = earth[i + 3]! + rho * rate
        if (!partials) continue
        const place = 6 * i
        const velocity = 6 * i + 18
        partials[place] = rho * east[i]!
        partials[place + 1] = rho * north[i]!
        partials[place + 4] = rho * w
        partials[velocity] = rho * values[5]! * east[i]!
        partials[velocity + 1] = rho * values[5]! * north[i]!
        partials[velocity + 2] = rho * east[i]!
        partials[velocity + 3] = rho * north[i]!
        partials[velocity + 4] = rho * rate
        partials[velocity + 5] = rho * w
      }
      return isPossible(state)
    },
  }
}

/**
 * Parameters of a state.
 * @param reference line of sight and the Earth at the epoch.
 * @param state six numbers at the epoch, heliocentric, au and au/d.
 * @returns (ξ, η, ξ̇, η̇, ln ρ, ρ̇/ρ); NaN where the body is not on the side of the line of sight.
 * Source: after Bernstein & Khushalani 2000, AJ 120, 3323.
 */
export function sightOfState(reference: SightReference, state: ArrayLike<number>): Float64Array {
  const { earth, direction: u } = reference
  const { east, north } = tangentsOf(u)
  const d: Vector = [state[0]! - earth[0]!, state[1]! - earth[1]!, state[2]! - earth[2]!]
  const rate: Vector = [state[3]! - earth[3]!, state[4]! - earth[4]!, state[5]! - earth[5]!]
  const rho = dot(d, u)
  const [xi, eta, along] = [dot(d, east) / rho, dot(d, north) / rho, dot(rate, u) / rho]
  return Float64Array.of(xi, eta, dot(rate, east) / rho - along * xi, dot(rate, north) / rho - along * eta, rho > 0 ? log(rho) : NaN, along)
}

function squareTo(motion: Vector): { first: Vector; second: Vector } {
  const axis: Vector = Math.abs(motion[2]) < 0.8 ? [0, 0, 1] : [1, 0, 0]
  const raw = cross(axis, motion)
  const length = lengthOf(raw)
  const first: Vector = [raw[0] / length, raw[1] / length, raw[2] / length]
  return { first, second: cross(motion, first) }
}

/**
 * The map of a held parabola.
 * @param reference with the direction of motion m₀, a unit vector.
 * @returns the map from (ξ, η, ln ρ, a, b); every state has the speed √(2μ/r).
 * Source: definition of the parabola, ε = 0.
 */
export function parabolaMap(reference: SightReference & { motion: Vector }): StateMap {
  const { earth, direction: u, motion } = reference
  const { east, north } = tangentsOf(u)
  const { first, second } = squareTo(motion)
  return {
    names: PARABOLA_NAMES,
    parameters: 5,
    stateInto(values, state, partials) {
      if (!(Math.abs(values[2]!) <= LARGEST_LN_DISTANCE)) return false
      const rho = exp(values[2]!)
      const w = [0, 1, 2].map((i) => u[i]! + values[0]! * east[i]! + values[1]! * north[i]!)
      const m = [0, 1, 2].map((i) => motion[i]! + values[3]! * first[i]! + values[4]! * second[i]!) as unknown as Vector
      for (let i = 0; i < 3; i++) state[i] = earth[i]! + rho * w[i]!
      const place: Vector = [state[0]!, state[1]!, state[2]!]
      const r = lengthOf(place)
      const length = lengthOf(m)
      const speed = Math.sqrt(2 * MU / r)
      for (let i = 0; i < 3; i++) state[i + 3] = speed * m[i]! / length
      if (partials) {
        const byPlace = [east.map((x) => rho * x), north.map((x) => rho * x), w.map((x) => rho * x)]
        for (let i = 0; i < 3; i++) {
          byPlace.forEach((gradient, j) => {
            partials[5 * i + j] = gradient[i]!
            partials[5 * (i + 3) + j] = -state[i + 3]! * dot(place, gradient as unknown as Vector) / (2 * r * r)
          })
          partials[5 * i + 3] = partials[5 * i + 4] = 0
          partials[5 * (i + 3) + 3] = speed / length * (first[i]! - m[i]! * dot(m, first) / (length * length))
          partials[5 * (i + 3) + 4] = speed / length * (second[i]! - m[i]! * dot(m, second) / (length * length))
        }
      }
      return r > 0
    },
  }
}

/**
 * Parameters of the parabola that a state suggests: its place and its direction of motion.
 * @param reference line of sight and the Earth at the epoch.
 * @param state six numbers at the epoch, heliocentric, au and au/d.
 * @returns the reference with that direction of motion, and the start (ξ, η, ln ρ, 0, 0).
 * Source: definition of the parabola, ε = 0.
 */
export function parabolaNear(reference: SightReference, state: ArrayLike<number>): { reference: SightReference & { motion: Vector }; start: Float64Array } {
  const velocity: Vector = [state[3]!, state[4]!, state[5]!]
  const speed = lengthOf(velocity)
  const sight = sightOfState(reference, state)
  return {
    reference: { ...reference, motion: [velocity[0] / speed, velocity[1] / speed, velocity[2] / speed] },
    start: Float64Array.of(sight[0]!, sight[1]!, sight[4]!, 0, 0),
  }
}
