/** The conic: Kepler's equation, anomalies, Thiele–Innes constants, ephemerides, states and constants of motion. */
export * from './anomalies'
export * from './constants'
export * from './ephemeris'
export { hyperbolicAnomalyRad, solveBarker } from './hyperbolic-kepler'
export { eccentricAnomalyRad, solveKeplerInto } from './kepler'
export * from './state'
export * from './thiele-innes'
