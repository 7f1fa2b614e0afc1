/** A state to predict from where the elements are known and nothing is to be fitted. */
import { earthHeliocentric } from '../earth'
import { EQUATORIAL_NAMES, sightOfState } from '../models/sight-frame'
import { stateFromPerihelion, type PerihelionElements } from '../models/perihelion'
import type { FitState } from '../types'

/**
 * The state of known elements, as predict takes it.
 * @param elements q (au), e, i, Ω, ω (rad, ecliptic and equinox of J2000) and T (JD of TT); any e ≥ 0.
 * @param epochJdTt epoch of the elements, JD of TT; matters with the planets only.
 * @param forces 'sun' (default) or 'planets'.
 * @returns a state without errors.
 * @throws RangeError where the body stands at the centre of the Earth, or for numbers that are none (a programmer's error).
 * Source: as models/perihelion.ts.
 */
export function stateOfElements(elements: PerihelionElements, epochJdTt: number, forces: 'sun' | 'planets' = 'sun'): FitState {
  const state = stateFromPerihelion(elements, epochJdTt)
  const earth = new Float64Array(6)
  earthHeliocentric(epochJdTt, earth)
  const line = [0, 1, 2].map((k) => state[k]! - earth[k]!)
  const distance = Math.sqrt(line.reduce((sum, part) => sum + part * part, 0))
  if (!(distance > 0 && distance < Infinity)) throw new RangeError('stateOfElements: the elements give no direction from the Earth.')
  const reference = { jdTt: epochJdTt, earth: Array.from(earth), direction: line.map((part) => part / distance) as unknown as [number, number, number] }
  return {
    model: 'sight', names: [...EQUATORIAL_NAMES], values: Array.from(sightOfState(reference, state)), covariance: null, referenceEpochYr: 0, reference, forces,
  }
}
