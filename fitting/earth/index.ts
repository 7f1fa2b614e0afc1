/** The Earth, its rotation and stations, the observer of a measure, and the planets as perturbers. */
export { AU_KM, LIGHT_AU_PER_D, OBLIQUITY_J2000_RAD, SUN_GRAVITATION_AU3_PER_D2 } from './constants'
export { earthHeliocentric, EARTH_SERIES_YEARS, sunBarycentric, sunBarycentricVelocity } from './earth-state'
export { earthOrientation, earthRotationAngleRad, type EarthOrientation, greenwichMeanSiderealRad, toIcrsAxes } from './earth-rotation'
export { eclipticFromEquatorial, equatorialFromEcliptic } from './ecliptic'
export { observerHeliocentric, type ObserverPlace } from './observer'
export { observerWarnings } from './observer-warnings'
export { type Planet, planetHeliocentric, PLANETS, SUN_OVER_PLANET_MASS } from './planets'
export { type Ellipsoid, type GeodeticPlace, type ParallaxPlace, parallaxPlace, stationOfDateInto, type StationPlace, stationVector, WGS84 } from './station'
