/** An orbit about the Sun as it was fitted: reference, map of its parameters, and motion under the forces it was fitted with. */
import { moveInto } from '../conic/universal'
import { SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import type { FitState, SightReference } from '../types'
import { planetMotion } from './planet-motion'
import { parabolaMap, sightMap, type StateMap } from './sight-frame'
import { sunMotion, type Motion } from './line-of-sight'

export type Forces = 'sun' | 'planets'

export interface EquatorialOrbit {
  reference: SightReference
  map: StateMap
  motion: Motion
  forces: Forces
}

/**
 * The orbit of a reference.
 * @param reference with a direction of motion for a held parabola, else without.
 * @param forces that move it.
 * @returns its map and motion.
 */
export function equatorialOrbit(reference: SightReference, forces: Forces): EquatorialOrbit {
  const { motion } = reference
  return {
    reference, forces,
    map: motion ? parabolaMap({ ...reference, motion }) : sightMap(reference),
    motion: forces === 'planets' ? planetMotion(reference.jdTt) : sunMotion(reference.jdTt),
  }
}

/**
 * The orbit of a result's state.
 * @param state of a result of the kind equatorial.
 * @returns its map and motion.
 * @throws RangeError where the state is of another kind (a programmer's error).
 */
export function orbitOfState(state: FitState): EquatorialOrbit {
  if (!state.reference) throw new RangeError('This state is not that of a comet or minor planet: it has no reference.')
  return equatorialOrbit(state.reference, state.forces ?? 'sun')
}

/**
 * Heliocentric state of parameters at the epoch of their reference.
 * @param orbit with its map.
 * @param values parameters inside the domain.
 * @returns place (au) and velocity (au/d), equatorial axes of the ICRS; a held parabola has exactly the parabolic speed.
 */
export function stateOfValues({ map }: EquatorialOrbit, values: ArrayLike<number>): Float64Array {
  const state = new Float64Array(6)
  map.stateInto(values, state, null)
  return state
}

/**
 * A state moved along its conic.
 * @param state place (au) and velocity (au/d).
 * @param days of either sign.
 * @returns the state then; null where it cannot be followed.
 */
export function movedAlongConic(state: ArrayLike<number>, days: number): Float64Array | null {
  const moved = new Float64Array(6)
  return moveInto(state, MU, days, moved) ? moved : null
}
