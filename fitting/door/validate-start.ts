/** A start is an earlier result's state; one that does not belong to this kind of fit is refused. */
import { LARGEST_S, RELATIVE_KEPLER_NAMES } from '../models/relative-kepler'
import { PLANE_NAMES } from '../models/plane'
import type { FitStart, Kind } from '../types'
import { refuse } from './refusal'

const REMEDY = 'Leave the start out, and the search begins from nothing.'

function isInsideDomain(kind: Kind, values: readonly number[]): boolean {
  if (kind === 'plane') return values[0]! > 0
  return Math.abs(values[0]!) < 50 && values[1]! * values[1]! + values[2]! * values[2]! <= LARGEST_S * LARGEST_S
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
  const names: readonly string[] = kind === 'plane' ? PLANE_NAMES : RELATIVE_KEPLER_NAMES
  const belongs = Array.isArray(state?.values) && state.values.length === names.length && Array.isArray(state.names)
    && names.every((name, i) => state.names[i] === name)
  if (!belongs) refuse('setting-out-of-range', 'The start does not belong to this kind of orbit.', REMEDY)
  const numbers = [...state.values, state.referenceEpochYr]
  if (!numbers.every((value) => typeof value === 'number' && value - value === 0) || !isInsideDomain(kind, state.values)) {
    refuse('setting-out-of-range', 'The start holds values that no orbit has.', REMEDY)
  }
}
