/** The engine's only door. */
export { fitOrbit } from './door/fit-orbit'
export { predict } from './door/predict'
export { LARGEST_MEASURES } from './door/validate-measures'
export { ENGINE_VERSION } from './version'
export * from './types'
