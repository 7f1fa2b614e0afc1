/**
 * Over which arc a motion about the Sun alone is honest.
 * Measured on 40 planet-perturbed orbits a class, the largest residual of the best conic at 30, 60, 90 days is 0.003, 0.03, 0.11″ at the median for
 * the main belt and 0.03, 0.14, 0.37″ for one in ten; near the Earth one in ten is 0.02, 0.2, 0.67″ off, and inside 0.1 au 5.6″ after
 * ten days. So: honest to 60 days (main belt, comets) or 30 days (perihelion inside 1.3 au and e below 0.9), strained to 90.
 * Source: the project's own measurements; see fitting/README.md.
 */
import type { HonestArc } from '../types'

const MAIN_BELT_DAYS = 60
const NEAR_EARTH_DAYS = 30
const STRAINED_TO_DAYS = 90
const NEAR_EARTH_WITHIN_Q_AU = 1.3
/** Above this e with a perihelion inside 1.3 au a body is taken for a comet, whose conic holds as long as the main belt's. */
const COMET_FROM_E = 0.9
const CLOSE_TO_EARTH_AU = 0.1
/** Inside this distance, or past 30 days, planets are taken into account by default. */
const PLANETS_INSIDE_AU = 0.3
const PLANETS_BEYOND_DAYS = 30

export interface ArcFindings {
  days: number
  perihelionDistanceAu: number
  eccentricity: number
  /** Smallest distance from the observer over the used measures, au. */
  nearestAu: number
  forces: 'sun' | 'planets'
}

/**
 * Forces that a fit takes unless it is told.
 * @param days of the arc.
 * @param nearestAu smallest distance over it, au.
 * @returns 'planets' past 30 days or inside 0.3 au.
 * Source: fitting/README.md.
 */
export function defaultForces(days: number, nearestAu: number): 'sun' | 'planets' {
  return days > PLANETS_BEYOND_DAYS || nearestAu < PLANETS_INSIDE_AU ? 'planets' : 'sun'
}

/**
 * The statement that goes with every equatorial result.
 * @param findings arc, orbit and forces.
 * @returns days, limit, standing and a sentence.
 * Source: fitting/README.md.
 */
export function honestArc({ days, perihelionDistanceAu, eccentricity, nearestAu, forces }: ArcFindings): HonestArc {
  const isNearEarth = perihelionDistanceAu < NEAR_EARTH_WITHIN_Q_AU && eccentricity < COMET_FROM_E
  const isClose = nearestAu < CLOSE_TO_EARTH_AU
  const limit = isClose ? 0 : isNearEarth ? NEAR_EARTH_DAYS : MAIN_BELT_DAYS
  const arc = days < 10 ? days.toFixed(1) : days.toFixed(0)
  const holdsFor = isNearEarth ? 'a body whose perihelion lies inside 1.3 au' : 'the main belt and comets'
  if (forces === 'planets') {
    return { days, honestUntilDays: limit, standing: 'perturbed', statement: `The eight planets were taken into account over the arc of ${arc} days; the elements are those of the osculating conic at their epoch. The Moon apart from the Earth, larger minor planets, relativity and outgassing were not.` }
  }
  if (isClose) {
    return { days, honestUntilDays: 0, standing: 'needs-perturbations', statement: `The body came within ${nearestAu.toFixed(3)} au of the observer: motion about the Sun alone misses it by seconds of arc within days. It needs perturbations.` }
  }
  if (days <= limit) {
    return { days, honestUntilDays: limit, standing: 'honest', statement: `The arc of ${arc} days lies within the ${limit} days over which motion about the Sun alone holds for ${holdsFor}. A prediction a year ahead is off by 20 to 50″ (one in ten: 170″) beside its stated error.` }
  }
  if (days <= STRAINED_TO_DAYS) {
    return { days, honestUntilDays: limit, standing: 'strained', statement: `The arc of ${arc} days is longer than the ${limit} days over which motion about the Sun alone holds for ${holdsFor}: the planets shift the elements by about as much as their errors.` }
  }
  return { days, honestUntilDays: limit, standing: 'needs-perturbations', statement: `The arc of ${arc} days is far longer than the ${limit} days over which motion about the Sun alone holds for ${holdsFor}: it needs perturbations by the planets, and the errors stated are too small.` }
}
