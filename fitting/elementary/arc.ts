/**
 * Inverse circular functions.
 * atan: the argument is moved near 0 by atan x = atan c + atan((x − c)/(1 + c·x)), c in {0, ½, 1, 3⁄2, ∞}, then a minimax
 * polynomial. asin: rational approximation of (asin x − x)/x³, with asin x = π/2 − 2·asin √((1 − x)/2) above ½.
 * Coefficients: fdlibm 5.3, s_atan.c, e_atan2.c, e_asin.c, e_acos.c, © 1993 Sun Microsystems, freely usable with this notice preserved.
 */
import { withoutLowWord } from './float-bits'
import { HALF_PI, PI } from './constants'

const A0 = 3.33333333333329318027e-01
const A1 = -1.99999999998764832476e-01
const A2 = 1.42857142725034663711e-01
const A3 = -1.11111104054623557880e-01
const A4 = 9.09088713343650656196e-02
const A5 = -7.69187620504482999495e-02
const A6 = 6.66107313738753120669e-02
const A7 = -5.83357013379057348645e-02
const A8 = 4.97687799461593236017e-02
const A9 = -3.65315727442169155270e-02
const A10 = 1.62858201153657823623e-02

const ATAN_HALF = 4.63647609000806093515e-01
const ATAN_HALF_LOW = 2.26987774529616870924e-17
const ATAN_ONE = 7.85398163397448278999e-01
const ATAN_ONE_LOW = 3.06161699786838301793e-17
const ATAN_THREE_HALVES = 9.82793723247329054082e-01
const ATAN_THREE_HALVES_LOW = 1.39033110312309984516e-17
const HALF_PI_LOW = 6.12323399573676603587e-17
const PI_LOW = 1.2246467991473532e-16

/** (atan x)/x subtracted from 1, |x| ≤ 7/16. */
function atanDeficit(x: number): number {
  const z = x * x
  const w = z * z
  const even = z * (A0 + w * (A2 + w * (A4 + w * (A6 + w * (A8 + w * A10)))))
  const odd = w * (A1 + w * (A3 + w * (A5 + w * (A7 + w * A9))))
  return even + odd
}

function atanPositive(x: number): number {
  if (x < 0.4375) return x - x * atanDeficit(x)
  if (x < 0.6875) {
    const t = (2 * x - 1) / (2 + x)
    return ATAN_HALF - ((t * atanDeficit(t) - ATAN_HALF_LOW) - t)
  }
  if (x < 1.1875) {
    const t = (x - 1) / (x + 1)
    return ATAN_ONE - ((t * atanDeficit(t) - ATAN_ONE_LOW) - t)
  }
  if (x < 2.4375) {
    const t = (x - 1.5) / (1 + 1.5 * x)
    return ATAN_THREE_HALVES - ((t * atanDeficit(t) - ATAN_THREE_HALVES_LOW) - t)
  }
  const t = -1 / x
  return HALF_PI - ((t * atanDeficit(t) - HALF_PI_LOW) - t)
}

/**
 * Arc tangent.
 * @param x any double.
 * @returns atan x, rad, −π/2 to π/2, within 1 ulp; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_atan.c.
 */
export function atan(x: number): number {
  if (x === 0) return x
  return x < 0 ? -atanPositive(-x) : atanPositive(x)
}

/**
 * Angle of the point (x, y) from the positive x axis.
 * @param y ordinate, any double.
 * @param x abscissa, any double.
 * @returns the angle, rad, −π to π, within 1 ulp; signed zeros and infinities as ECMAScript's Math.atan2; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_atan2.c.
 */
export function atan2(y: number, x: number): number {
  const ay = y < 0 ? -y : y
  const ax = x < 0 ? -x : x
  if (!(ay > 0 && ax > 0 && ay < Infinity && ax < Infinity)) return atan2AtEdge(y, x)
  const quotient = ay / ax
  let angle: number
  if (quotient > 1152921504606846976) angle = HALF_PI
  else if (x < 0 && quotient < 8.673617379884035e-19) angle = 0
  else angle = atanPositive(quotient)
  if (x < 0) angle = PI - (angle - PI_LOW)
  return y < 0 ? -angle : angle
}

/** The cases with a zero, an infinity or NaN. */
function atan2AtEdge(y: number, x: number): number {
  if (y !== y || x !== x) return NaN
  const isYNegative = y < 0 || 1 / y < 0
  const isXNegative = x < 0 || 1 / x < 0
  let angle: number
  if (y === 0) angle = isXNegative ? PI : 0
  else if (x === 0) angle = HALF_PI
  else if (x === Infinity || x === -Infinity) {
    const isDiagonal = y === Infinity || y === -Infinity
    if (isDiagonal) angle = isXNegative ? 3 * ATAN_ONE : ATAN_ONE
    else angle = isXNegative ? PI : 0
  }
  else angle = HALF_PI
  return isYNegative ? -angle : angle
}

const P0 = 1.66666666666666657415e-01
const P1 = -3.25565818622400915405e-01
const P2 = 2.01212532134862925881e-01
const P3 = -4.00555345006794114027e-02
const P4 = 7.91534994289814532176e-04
const P5 = 3.47933107596021167570e-05
const Q1 = -2.40339491173441421878
const Q2 = 2.02094576023350569471
const Q3 = -6.88283971605453293030e-01
const Q4 = 7.70381505559019352791e-02

/** (asin x − x)/x as a function of t = x², t ≤ ¼. */
function asinExcess(t: number): number {
  const p = t * (P0 + t * (P1 + t * (P2 + t * (P3 + t * (P4 + t * P5)))))
  const q = 1 + t * (Q1 + t * (Q2 + t * (Q3 + t * Q4)))
  return p / q
}

function asinPositive(x: number): number {
  if (x < 0.5) return x + x * asinExcess(x * x)
  const t = (1 - x) * 0.5
  const r = asinExcess(t)
  const s = Math.sqrt(t)
  if (x >= 0.975) return HALF_PI - (2 * (s + s * r) - HALF_PI_LOW)
  const f = withoutLowWord(s)
  const c = (t - f * f) / (s + f)
  return ATAN_ONE - ((2 * s * r - (HALF_PI_LOW - 2 * c)) - (ATAN_ONE - 2 * f))
}

/**
 * Arc sine.
 * @param x −1 to 1.
 * @returns asin x, rad, −π/2 to π/2, within 1 ulp; NaN outside the range.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_asin.c.
 */
export function asin(x: number): number {
  if (!(x >= -1 && x <= 1)) return NaN
  if (x === 0) return x
  return x < 0 ? -asinPositive(-x) : asinPositive(x)
}

/**
 * Arc cosine.
 * @param x −1 to 1.
 * @returns acos x, rad, 0 to π, within 1 ulp; NaN outside the range.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), e_acos.c.
 */
export function acos(x: number): number {
  if (!(x >= -1 && x <= 1)) return NaN
  if (x < 0.5 && x > -0.5) return HALF_PI - (x - (HALF_PI_LOW - x * asinExcess(x * x)))
  if (x < 0) {
    const t = (1 + x) * 0.5
    const s = Math.sqrt(t)
    return PI - 2 * (s + (asinExcess(t) * s - HALF_PI_LOW))
  }
  const t = (1 - x) * 0.5
  if (t === 0) return 0
  const s = Math.sqrt(t)
  const f = withoutLowWord(s)
  const c = (t - f * f) / (s + f)
  return 2 * (f + (asinExcess(t) * s + c))
}
