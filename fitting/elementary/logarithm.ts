/**
 * Natural logarithm and ln(1 + x): x = 2^k·(1 + f), √½ < 1 + f < √2, s = f/(2 + f), ln(1 + f) = 2s + s·R(s²).
 * Coefficients: fdlibm 5.3, e_log.c and s_log1p.c, © 1993 Sun Microsystems, freely usable with this notice preserved.
 */
import { highWord, powerOfTwo, withHighWord } from './float-bits'

const LN2_HIGH = 6.93147180369123816490e-01
const LN2_LOW = 1.90821492927058770002e-10
const TWO_54 = 18014398509481984
const L1 = 6.666666666666735130e-01
const L2 = 3.999999999940941908e-01
const L3 = 2.857142874366239149e-01
const L4 = 2.222219843214978396e-01
const L5 = 1.818357216161805012e-01
const L6 = 1.531383769920937332e-01
const L7 = 1.479819860511658591e-01

/** R(s²) of the series above. */
function remainder(s: number): number {
  const z = s * s
  const w = z * z
  return w * (L2 + w * (L4 + w * L6)) + z * (L1 + w * (L3 + w * (L5 + w * L7)))
}

/**
 * Natural logarithm.
 * @param x any double.
 * @returns ln x within 1 ulp; −Infinity at 0, Infinity at Infinity; NaN below 0 and for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_log.c.
 */
export function log(x: number): number {
  if (x === 0) return -Infinity
  if (!(x > 0)) return NaN
  if (x === Infinity) return x
  if (x < 2.2250738585072014e-308) return logNormal(x * TWO_54, -54)
  return logNormal(x, 0)
}

/** ln x + already·ln 2 for a normal positive x; the sum with 0x95F64 carries into the exponent where the significand exceeds √2. */
function logNormal(x: number, already: number): number {
  const high = highWord(x)
  const exponent = ((high + 0x95F64) >> 20) - 1023
  const k = exponent + already
  const f = x * powerOfTwo(-exponent) - 1
  if (f === 0) return k * LN2_HIGH + k * LN2_LOW
  const s = f / (2 + f)
  const half = 0.5 * f * f
  return k * LN2_HIGH - ((half - (s * (half + remainder(s)) + k * LN2_LOW)) - f)
}

/**
 * ln(1 + x) without loss of figures near 0.
 * @param x above −1.
 * @returns ln(1 + x) within 1 ulp; −Infinity at −1; x itself at ±0; NaN below −1 and for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_log1p.c.
 */
export function log1p(x: number): number {
  if (!(x > -1)) return x === -1 ? -Infinity : NaN
  if (x === Infinity) return x
  if (x < 5.551115123125783e-17 && x > -5.551115123125783e-17) return x
  if (x > -0.2929 && x < 0.41422) {
    const half = 0.5 * x * x
    const s = x / (2 + x)
    return x - (half - s * (half + remainder(s)))
  }
  const u = 1 + x
  let high = highWord(u)
  let k = (high >> 20) - 1023
  const lost = (k > 0 ? 1 - (u - x) : x - (u - 1)) / u
  high &= 0x000FFFFF
  const isLowerHalf = high < 0x6A09E
  const f = withHighWord(u, isLowerHalf ? high | 0x3FF00000 : high | 0x3FE00000) - 1
  if (!isLowerHalf) k++
  if (f === 0) return k * LN2_HIGH + (lost + k * LN2_LOW)
  const half = 0.5 * f * f
  const s = f / (2 + f)
  return k * LN2_HIGH - ((half - (s * (half + remainder(s)) + (k * LN2_LOW + lost))) - f)
}
