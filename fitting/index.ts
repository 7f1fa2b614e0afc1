/** The engine's only door. */
export { apparentPlace, apparentPlaces, type ApparentPlace, type CampbellElements } from './conic/ephemeris'
export { fitOrbit } from './door/fit-orbit'
export { predict } from './door/predict'
export { LARGEST_MEASURES } from './door/validate-measures'
export { randomStream, type RandomStream } from './random'
export * from './time'
export * from './types'
export { ENGINE_VERSION } from './version'
