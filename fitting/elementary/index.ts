/**
 * Elementary functions that give the same bits in every JavaScript engine: they use only + − × ÷, integer operators,
 * Math.sqrt, abs, floor, round, min and max, all of which ECMAScript fixes exactly.
 */
export { acos, asin, atan, atan2 } from './arc'
export { DEG, HALF_PI, PI, RAD, TWO_PI } from './constants'
export { exp, expm1 } from './exponential'
export { asinh, atanh, cosh, sinh, tanh } from './hyperbolic'
export { log, log1p } from './logarithm'
export { reduceToQuadrant } from './quadrant'
export { cbrt, cbrtRough, hypot } from './roots'
export { cos, sin, sinCosInto } from './sin-cos'
