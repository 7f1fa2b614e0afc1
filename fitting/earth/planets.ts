/**
 * The eight planets as perturbers: mean elements with secular rates and the largest periodic terms of a and of the mean longitude.
 *
 * Symbols: T Julian millennia of TT since J2000.0; a semi-major axis, λ mean longitude, e eccentricity, ϖ longitude of perihelion,
 * i inclination, Ω node, on the ecliptic and equinox of J2000.
 *
 * Source: Simon et al. 1994, Numerical expressions for precession formulae and mean elements for the Moon and the planets, A&A 282, 663.
 */
import { cos, DEG, sin } from '../elementary'
import { stateFromElements, type Vector } from '../conic/state'
import { trueFromMeanRad } from '../conic/anomalies'
import { JD_J2000 } from '../time/epochs'
import { SUN_GRAVITATION_AU3_PER_D2 } from './constants'
import { equatorialFromEcliptic } from './ecliptic'
import { PLANET_TERMS, type PlanetTerms } from './planet-terms'

/** Earth and Moon together count as one at their barycentre. */
export const PLANETS = ['mercury', 'venus', 'earth-moon', 'mars', 'jupiter', 'saturn', 'uranus', 'neptune'] as const
export type Planet = (typeof PLANETS)[number]

/**
 * Mass of the Sun in masses of each planet with its moons.
 * Source: Luzum et al. 2011, The IAU 2009 system of astronomical constants, Celestial Mechanics and Dynamical Astronomy 110, 293;
 * Earth and Moon from its 332946.0487 and 1.23000371e-2.
 */
export const SUN_OVER_PLANET_MASS: Readonly<Record<Planet, number>> = {
  'mercury': 6.0236e6,
  'venus': 4.08523719e5,
  'earth-moon': 328900.5596,
  'mars': 3.09870359e6,
  'jupiter': 1.047348644e3,
  'saturn': 3.4979018e3,
  'uranus': 2.290298e4,
  'neptune': 1.941226e4,
}

const DAYS_PER_MILLENNIUM = 365250
const ARCSEC = DEG / 3600
/** The periodic terms run in multiples of this, rad a millennium. */
const ARGUMENT_RATE = 0.35953620
const PERIODIC_UNIT = 1e-7

/**
 * Heliocentric state of a planet, good enough to perturb: in longitude within 9″ (Mercury to Earth), 26″ (Mars), 78″ (Jupiter), 87″
 * (Saturn, Uranus), 11″ (Neptune) of an integrated ephemeris from 1800 to 2100, half as much again from 1000 to 3000.
 * The velocity is that of the ellipse of the moment, within 1 % of the slope of the path.
 * @param planet which.
 * @param jdTt JD of TT, d.
 * @param out receives x, y, z (au) and vx, vy, vz (au/d), mean equator and equinox of J2000 (within 0.03″ of the ICRS).
 * Source: Simon et al. 1994, A&A 282, 663; errors as the authors of ERFA found for eraPlan94 against DE200.
 */
export function planetHeliocentric(planet: Planet, jdTt: number, out: Float64Array): void {
  const millennia = (jdTt - JD_J2000) / DAYS_PER_MILLENNIUM
  const terms = PLANET_TERMS[planet]
  const semiMajorAxis = polynomial(terms.semiMajorAxisAu, millennia) + periodic(terms.axisMultiples, terms.axisCosine, terms.axisSine, millennia)
  const longitudeRad = angleOf(terms.longitude, millennia) + periodic(terms.longitudeMultiples, terms.longitudeCosine, terms.longitudeSine, millennia)
  const eccentricity = polynomial(terms.eccentricity, millennia)
  const perihelionRad = angleOf(terms.perihelion, millennia)
  const nodeRad = angleOf(terms.node, millennia)
  const gravitation = SUN_GRAVITATION_AU3_PER_D2 * (1 + 1 / SUN_OVER_PLANET_MASS[planet])
  const { place, velocity } = stateFromElements({
    semiLatusRectum: semiMajorAxis * (1 - eccentricity) * (1 + eccentricity),
    eccentricity,
    inclinationRad: angleOf(terms.inclination, millennia),
    nodeRad,
    argumentOfPeriapsisRad: perihelionRad - nodeRad,
    trueAnomalyRad: trueFromMeanRad(longitudeRad - perihelionRad, eccentricity),
  }, gravitation)
  write(equatorialFromEcliptic(place), out, 0)
  write(equatorialFromEcliptic(velocity), out, 3)
}

function write(vector: Vector, out: Float64Array, from: number): void {
  out[from] = vector[0]
  out[from + 1] = vector[1]
  out[from + 2] = vector[2]
}

function polynomial(coefficients: readonly number[], t: number): number {
  return coefficients[0]! + t * (coefficients[1]! + t * coefficients[2]!)
}

/** Degrees, arcseconds a millennium and a millennium squared, in rad. */
function angleOf(coefficients: PlanetTerms['node'], t: number): number {
  return coefficients[0] * DEG + ARCSEC * t * (coefficients[1] + t * coefficients[2])
}

/** Σ (C·cos kμ + S·sin kμ); from the ninth multiple on the terms grow with the time. */
function periodic(multiples: readonly number[], cosine: readonly number[], sine: readonly number[], t: number): number {
  let sum = 0
  for (let k = 0; k < multiples.length; k++) {
    const argument = multiples[k]! * ARGUMENT_RATE * t
    sum += (k < 8 ? 1 : t) * (cosine[k]! * cos(argument) + sine[k]! * sin(argument))
  }
  return sum * PERIODIC_UNIT
}
