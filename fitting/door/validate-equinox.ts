/** Equinoxes of measures and the place of the pair, checked. */
import { PI } from '../elementary'
import type { FitSettings, RelativeMeasure } from '../types'
import { refuse } from './refusal'

const FIRST_YR = 1600
const LAST_YR = 2500

/**
 * Refuses equinoxes out of range and places that are none.
 * @param measures with thetaEquinoxYr where it was given.
 * @param settings with targetPosition where it was given.
 * @throws RefusedRequest 'value-out-of-range' or 'setting-out-of-range'.
 */
export function validateEquinoxes(measures: readonly RelativeMeasure[], { targetPosition }: FitSettings): void {
  for (const { id, thetaEquinoxYr } of measures) {
    if (thetaEquinoxYr === undefined || (thetaEquinoxYr >= FIRST_YR && thetaEquinoxYr <= LAST_YR)) continue
    refuse('value-out-of-range', `Measure ${id}: the equinox of the position angle is not a Julian year from ${FIRST_YR} to ${LAST_YR}.`, 'Correct it, or leave it out.')
  }
  if (targetPosition === undefined) return
  const isPlace = targetPosition !== null && typeof targetPosition === 'object' && targetPosition.rightAscensionRad - targetPosition.rightAscensionRad === 0
    && Math.abs(targetPosition.declinationRad) <= PI / 2
  if (!isPlace) refuse('setting-out-of-range', 'The place of the pair is not a right ascension and a declination.', 'Give both in radians at J2000.0, the declination from −π/2 to π/2.')
}

/** Refuses what cannot be turned. */
export function refuseUnplaced(unplaced: number): void {
  if (unplaced === 0) return
  refuse('setting-out-of-range', `${unplaced === 1 ? 'One position angle is' : `${unplaced} position angles are`} of another equinox than asked for, and the place of the pair on the sky is not known.`,
    'Give right ascension and declination of the pair, or leave thetaEquinox out to take position angles as they stand.')
}
