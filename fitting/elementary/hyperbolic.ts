/**
 * Hyperbolic functions from e^x − 1 and ln(1 + x), arranged so that nothing cancels near 0 and nothing overflows early.
 * Arrangement after fdlibm 5.3, e_sinh.c, e_cosh.c, s_tanh.c, e_atanh.c, s_asinh.c, © 1993 Sun Microsystems, freely usable
 * with this notice preserved.
 */
import { exp, expm1 } from './exponential'
import { log, log1p } from './logarithm'

const LN2 = 0.6931471805599453
const TINY = 3.725290298461914e-9

/**
 * Hyperbolic sine.
 * @param x any double.
 * @returns sinh x within 1 ulp; ±Infinity beyond 710.4758; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_sinh.c.
 */
export function sinh(x: number): number {
  const a = Math.abs(x)
  const half = x < 0 ? -0.5 : 0.5
  if (a < 22) {
    if (a < TINY) return x
    const t = expm1(a)
    return a < 1 ? half * (2 * t - t * t / (t + 1)) : half * (t + t / (t + 1))
  }
  return half * 2 * halfExp(a)
}

/**
 * Hyperbolic cosine.
 * @param x any double.
 * @returns cosh x within 1 ulp, ≥ 1; Infinity beyond 710.4758; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_cosh.c.
 */
export function cosh(x: number): number {
  const a = Math.abs(x)
  if (a < 0.5 * LN2) {
    const t = expm1(a)
    const w = 1 + t
    return 1 + (t * t) / (w + w)
  }
  if (a < 22) {
    const t = exp(a)
    return 0.5 * t + 0.5 / t
  }
  return halfExp(a)
}

/** e^a/2 for a ≥ 22 (or NaN), also where e^a itself overflows. */
function halfExp(a: number): number {
  if (a < 709.7822265625) return 0.5 * exp(a)
  if (a <= 710.4758600739439) {
    const root = exp(0.5 * a)
    return 0.5 * root * root
  }
  return a === a ? Infinity : NaN
}

/**
 * Hyperbolic tangent.
 * @param x any double.
 * @returns tanh x within 1 ulp, −1 to 1; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_tanh.c.
 */
export function tanh(x: number): number {
  const a = Math.abs(x)
  let value: number
  if (a < TINY) return x
  if (a >= 22) value = 1
  else if (a >= 1) value = 1 - 2 / (expm1(2 * a) + 2)
  else {
    const t = expm1(-2 * a)
    value = -t / (t + 2)
  }
  if (x !== x) return NaN
  return x < 0 ? -value : value
}

/**
 * Inverse hyperbolic tangent.
 * @param x −1 to 1.
 * @returns atanh x within 1 ulp; ±Infinity at ±1; NaN outside and for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_atanh.c.
 */
export function atanh(x: number): number {
  const a = Math.abs(x)
  if (!(a <= 1)) return NaN
  if (a < TINY) return x
  const twice = a + a
  const value = 0.5 * (a < 0.5 ? log1p(twice + twice * a / (1 - a)) : log1p(twice / (1 - a)))
  return x < 0 ? -value : value
}

/**
 * Inverse hyperbolic sine.
 * @param x any double.
 * @returns asinh x within 1 ulp; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_asinh.c.
 */
export function asinh(x: number): number {
  const a = Math.abs(x)
  if (a < TINY || !(a < Infinity)) return x
  let value: number
  if (a > 268435456) value = log(a) + LN2
  else if (a > 2) value = log(2 * a + 1 / (Math.sqrt(a * a + 1) + a))
  else value = log1p(a + a * a / (1 + Math.sqrt(1 + a * a)))
  return x < 0 ? -value : value
}
