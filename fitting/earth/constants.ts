/** Constants of the Earth and of the Sun's neighbourhood. Lengths are au, times days of TT unless the name says otherwise. */
import { DEG } from '../elementary'

/** Astronomical unit, km. Source: IAU 2012 Resolution B2. */
export const AU_KM = 149597870.7

/** Speed of light, au/d. Source: 299792.458 km/s (definition) and the au of IAU 2012 Resolution B2. */
export const LIGHT_AU_PER_D = 299792.458 * 86400 / AU_KM

/** Gravitational parameter of the Sun, au³/d²: k², k = 0.01720209895. Source: IAU 1976 System of Astronomical Constants. */
export const SUN_GRAVITATION_AU3_PER_D2 = 0.01720209895 * 0.01720209895

/** Obliquity of the ecliptic of J2000, rad: 84381.448″. Source: IAU 1976 System of Astronomical Constants. */
export const OBLIQUITY_J2000_RAD = 84381.448 / 3600 * DEG
