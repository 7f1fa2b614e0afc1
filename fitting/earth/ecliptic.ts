/**
 * Equator and ecliptic: a turn about the axis that both share, towards the equinox.
 *
 * Source: Meeus 1998, Astronomical Algorithms, 2nd ed., ch. 13.
 */
import { cos, sin } from '../elementary'
import type { Vector } from '../conic/state'
import { OBLIQUITY_J2000_RAD } from './constants'

/**
 * A vector on ecliptic axes from one on equatorial axes.
 * @param equatorial any unit; x towards the equinox, z towards the pole of the equator.
 * @param obliquityRad ε, rad; by default that of J2000, 84381.448″.
 * @returns the same vector, x towards the equinox, z towards the pole of the ecliptic.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 13.
 */
export function eclipticFromEquatorial(equatorial: Vector, obliquityRad: number = OBLIQUITY_J2000_RAD): Vector {
  return turnedAboutX(equatorial, cos(obliquityRad), sin(obliquityRad))
}

/**
 * A vector on equatorial axes from one on ecliptic axes.
 * @param ecliptic any unit; x towards the equinox, z towards the pole of the ecliptic.
 * @param obliquityRad ε, rad; by default that of J2000, 84381.448″.
 * @returns the same vector, x towards the equinox, z towards the pole of the equator.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 13.
 */
export function equatorialFromEcliptic(ecliptic: Vector, obliquityRad: number = OBLIQUITY_J2000_RAD): Vector {
  return turnedAboutX(ecliptic, cos(obliquityRad), -sin(obliquityRad))
}

/** Components on axes turned about x by the angle of that cosine and sine. */
function turnedAboutX(vector: Vector, cosine: number, sine: number): Vector {
  return [vector[0], vector[1] * cosine + vector[2] * sine, vector[2] * cosine - vector[1] * sine]
}
