/**
 * What is uncertain about the observers of a set of measures, in words for the page.
 *
 * Sources: as time-scales.ts (leap seconds, ΔT) and earth-state.ts (years of the series).
 */
import { isoDateFromJd } from '../time/iso-time'
import { julianEpochFromJd } from '../time/epochs'
import { LEAP_SECONDS_EXPIRE_JD, ttMinusUtcSeconds } from '../time/time-scales'
import { EARTH_SERIES_YEARS } from './earth-state'

/** JD of 1972 January 1, 0h UTC. */
const ATOMIC_SECONDS_JD = 2441317.5

/**
 * Sentences about times that the tables do not cover well.
 * @param jdsUtc JD of UTC of the measures, d, in any order.
 * @returns none where all is well; otherwise a sentence each for times after the leap-second table's expiry, before 1972, and outside
 * 1900 to 2100.
 * Source: as the tables themselves.
 */
export function observerWarnings(jdsUtc: readonly number[]): string[] {
  const { first, last } = EARTH_SERIES_YEARS
  const late = jdsUtc.filter(jd => jd > LEAP_SECONDS_EXPIRE_JD).length
  const early = jdsUtc.filter(jd => jd < ATOMIC_SECONDS_JD).length
  const remote = jdsUtc.map(julianEpochFromJd).filter(year => year < first || year > last).length
  const warnings: string[] = []
  if (late > 0) {
    warnings.push(`${measures(late)} later than ${isoDateFromJd(LEAP_SECONDS_EXPIRE_JD)}, where the table of leap seconds ends. TT − UTC was taken as `
      + `${ttMinusUtcSeconds(LEAP_SECONDS_EXPIRE_JD)} s; a leap second decided since would shift these times by 1 s. A newer version of the engine knows it.`)
  }
  if (early > 0) {
    warnings.push(`${measures(early)} earlier than 1972. Their times were taken as Universal Time and brought to TT by the table of ΔT, which is good `
      + 'to 0.2 s after 1900 and to several seconds before 1700.')
  }
  if (remote > 0) {
    warnings.push(`${measures(remote)} outside ${first} to ${last}. The Earth's place is good to 11 km within these years, to about 22 km in 1800 and `
      + '2200 and to about 110 km (0.15″ seen from 1 au) in 1500 and 2500.')
  }
  return warnings
}

function measures(count: number): string {
  return count === 1 ? '1 measure is' : `${count} measures are`
}
