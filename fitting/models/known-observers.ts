/**
 * Observers that were computed before: a refit of the same measures, as when one is set aside and taken back, need not sum the
 * Earth's series again. The same input gives the same numbers, so results do not depend on what was fitted before.
 */
import { observerHeliocentric, type ObserverPlace } from '../earth'
import type { MeasureSite } from '../types'

/** The memory is begun anew beyond this many observers (5 MB). */
const MOST_KNOWN = 20_000

const known = new Map<string, ObserverPlace>()

function keyOf(site: MeasureSite, jdUtc: number): string {
  const place = 'latitudeDeg' in site ? `g ${site.latitudeDeg} ${site.heightM}` : `p ${site.rhoCosPhi} ${site.rhoSinPhi}`
  return `${jdUtc} ${site.longitudeEastDeg} ${place}`
}

/**
 * Time, heliocentric place and the Sun's velocity for one measure, computed once.
 * @param site parallax constants or a geodetic place.
 * @param jdUtc JD of UTC, d.
 * @returns the observer; not to be changed.
 * Source: as earth/observer.ts.
 */
export function knownObserver(site: MeasureSite, jdUtc: number): ObserverPlace {
  const key = keyOf(site, jdUtc)
  const found = known.get(key)
  if (found) return found
  if (known.size >= MOST_KNOWN) known.clear()
  const observer = observerHeliocentric(site, jdUtc)
  known.set(key, observer)
  return observer
}
