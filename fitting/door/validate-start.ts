/** A start is an earlier result's state; one that does not belong to this kind of fit is refused. */
import { LARGEST_S, RELATIVE_KEPLER_NAMES } from '../models/relative-kepler'
import { PLANE_NAMES } from '../models/plane'
import { PLANE_MOTION_NAMES } from '../models/plane-motion'
import { EQUATORIAL_NAMES, PARABOLA_NAMES } from '../models/sight-frame'
import type { FitStart, FitState, Kind } from '../types'
import { refuse } from './refusal'

/** No parameter of an orbit about the Sun comes near this. */
const LARGEST_SIGHT_VALUE = 1000
const REMEDY = 'Leave the start out, and the search begins from nothing.'

function isInsideDomain(kind: Kind, values: readonly number[]): boolean {
  if (kind === 'equatorial') return values.every((value) => Math.abs(value) < LARGEST_SIGHT_VALUE)
  if (kind === 'plane') return values[0]! > 0 && values[3] !== 0
  return Math.abs(values[0]!) < 50 && values[1]! * values[1]! + values[2]! * values[2]! <= LARGEST_S * LARGEST_S
}

function namesOf(kind: Kind, state: FitState | undefined): readonly string[] {
  if (kind === 'plane') return state?.values?.length === PLANE_MOTION_NAMES.length ? PLANE_MOTION_NAMES : PLANE_NAMES
  if (kind === 'relative') return RELATIVE_KEPLER_NAMES
  return state?.model === 'parabola' ? PARABOLA_NAMES : EQUATORIAL_NAMES
}

/** Every number of the reference; NaN where one is missing, so that it is refused with the rest. */
function numbersOfReference({ reference, model }: FitState): unknown[] {
  const vector = (value: unknown, length: number) => (Array.isArray(value) && value.length === length ? value as unknown[] : [NaN])
  return [reference?.jdTt, ...vector(reference?.earth, 6), ...vector(reference?.direction, 3), ...(model === 'parabola' ? vector(reference?.motion, 3) : [])]
}

/**
 * Checks the state to start from.
 * @param kind of the request.
 * @param start as given, if any.
 * @throws RefusedRequest 'setting-out-of-range'.
 */
export function validateStart(kind: Kind, start: FitStart | undefined): void {
  if (start === undefined) return
  const state = start.state
  const names = namesOf(kind, state)
  const belongs = Array.isArray(state?.values) && state.values.length === names.length && Array.isArray(state.names)
    && names.every((name, i) => state.names[i] === name)
  if (!belongs) refuse('setting-out-of-range', 'The start does not belong to this kind of orbit.', REMEDY)
  const numbers = [...state.values, state.referenceEpochYr, ...(kind === 'equatorial' ? numbersOfReference(state) : [])]
  if (!numbers.every((value) => typeof value === 'number' && value - value === 0) || !isInsideDomain(kind, state.values)) {
    refuse('setting-out-of-range', 'The start holds values that no orbit has.', REMEDY)
  }
}
