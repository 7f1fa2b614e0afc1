/**
 * Exponential function and e^x − 1: x = k·ln 2 + r, |r| ≤ ½ ln 2, then a rational approximation in r.
 * Coefficients: fdlibm 5.3, e_exp.c and s_expm1.c, © 1993 Sun Microsystems, freely usable with this notice preserved.
 */
import { scaleByPowerOfTwo } from './float-bits'

const LN2_HIGH = 6.93147180369123816490e-01
const LN2_LOW = 1.90821492927058770002e-10
const INVERSE_LN2 = 1.44269504088896338700
const P1 = 1.66666666666666019037e-01
const P2 = -2.77777777770155933842e-03
const P3 = 6.61375632143793436117e-05
const P4 = -1.65339022054652515390e-06
const P5 = 4.13813679705723846039e-08
const OVERFLOW = 709.782712893384
const UNDERFLOW = -745.1332191019411
const HALF_LN2 = 0.34657359027997264

/**
 * Exponential function.
 * @param x any double.
 * @returns e^x within 1 ulp; Infinity above 709.78, 0 below −745.13; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_exp.c.
 */
export function exp(x: number): number {
  if (x > OVERFLOW) return Infinity
  if (x < UNDERFLOW) return 0
  if (x <= HALF_LN2 && x >= -HALF_LN2) {
    const t = x * x
    const c = x - t * (P1 + t * (P2 + t * (P3 + t * (P4 + t * P5))))
    return 1 - ((x * c) / (c - 2) - x)
  }
  if (x !== x) return NaN
  const k = Math.floor(INVERSE_LN2 * x + 0.5)
  const high = x - k * LN2_HIGH
  const low = k * LN2_LOW
  const r = high - low
  const t = r * r
  const c = r - t * (P1 + t * (P2 + t * (P3 + t * (P4 + t * P5))))
  return scaleByPowerOfTwo(1 - ((low - (r * c) / (2 - c)) - high), k)
}

const Q1 = -3.33333333333331316428e-02
const Q2 = 1.58730158725481460165e-03
const Q3 = -7.93650757867487942473e-05
const Q4 = 4.00821782732936239552e-06
const Q5 = -2.01099218183624371326e-07

/**
 * e^x − 1 without loss of figures near 0.
 * @param x any double.
 * @returns e^x − 1 within 1 ulp; Infinity above 709.78, −1 far below; x itself at ±0; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_expm1.c.
 */
export function expm1(x: number): number {
  if (x > OVERFLOW) return Infinity
  if (x < -38.816242) return -1
  if (x !== x) return NaN
  if (x < 5.551115123125783e-17 && x > -5.551115123125783e-17) return x
  const k = x <= HALF_LN2 && x >= -HALF_LN2 ? 0 : Math.floor(INVERSE_LN2 * x + 0.5)
  const high = x - k * LN2_HIGH
  const low = k * LN2_LOW
  const r = high - low
  const correction = (high - r) - low
  const half = 0.5 * r
  const square = r * half
  const r1 = 1 + square * (Q1 + square * (Q2 + square * (Q3 + square * (Q4 + square * Q5))))
  const t = 3 - r1 * half
  const e = square * ((r1 - t) / (6 - r * t))
  if (k === 0) return r - (r * e - square)
  return assembleExpm1(r, r * (e - correction) - correction - square, k)
}

/** 2^k·(1 + r − e) − 1, ordered so that nothing cancels. */
function assembleExpm1(r: number, e: number, k: number): number {
  if (k === -1) return 0.5 * (r - e) - 0.5
  if (k === 1) return r < -0.25 ? -2 * (e - (r + 0.5)) : 1 + 2 * (r - e)
  if (k <= -2 || k > 56) return scaleByPowerOfTwo(1 - (e - r), k) - 1
  const unit = scaleByPowerOfTwo(1, -k)
  if (k < 20) return scaleByPowerOfTwo((1 - unit) - (e - r), k)
  return scaleByPowerOfTwo((r - (e + unit)) + 1, k)
}
