/**
 * Sine and cosine: reduction to |y| ≤ π/4, then a minimax polynomial in y², the reduction's rounding error y₁ kept.
 *   sin(y + y₁) ≈ y + y³·S(y²) + y₁·cos y        cos(y + y₁) ≈ 1 − y²/2 + y⁴·C(y²) − y·y₁
 * Coefficients: fdlibm 5.3, k_sin.c and k_cos.c, © 1993 Sun Microsystems, freely usable with this notice preserved;
 * form of the cosine after the FreeBSD revision of k_cos.c. Error below 1 ulp.
 */
import { reduceToQuadrant } from './quadrant'

const S1 = -1.66666666666666324348e-01
const S2 = 8.33333333332248946124e-03
const S3 = -1.98412698298579493134e-04
const S4 = 2.75573137070700676789e-06
const S5 = -2.50507602534068634195e-08
const S6 = 1.58969099521155010221e-10
const C1 = 4.16666666666666019037e-02
const C2 = -1.38888888888741095749e-03
const C3 = 2.48015872894767294178e-05
const C4 = -2.75573143513906633035e-07
const C5 = 2.08757232129817482790e-09
const C6 = -1.13596475577881948265e-11
const QUARTER_PI = 0.7853981633974483

const reduced = new Float64Array(2)

function sinNearZero(y: number, tail: number): number {
  const z = y * y
  const v = z * y
  const r = S2 + z * (S3 + z * (S4 + z * (S5 + z * S6)))
  return y - ((z * (0.5 * tail - v * r) - tail) - v * S1)
}

function cosNearZero(y: number, tail: number): number {
  const z = y * y
  const zz = z * z
  const r = z * (C1 + z * (C2 + z * C3)) + zz * zz * (C4 + z * (C5 + z * C6))
  const half = 0.5 * z
  const w = 1 - half
  return w + (((1 - w) - half) + (z * r - y * tail))
}

/**
 * Sine and cosine of one angle, without allocation.
 * @param x angle, rad, any finite double (quick up to 1.6e6 in magnitude).
 * @param out receives sin x at [0] and cos x at [1]; both NaN where x is NaN or infinite.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), k_sin.c and k_cos.c.
 */
export function sinCosInto(x: number, out: Float64Array): void {
  if (x <= QUARTER_PI && x >= -QUARTER_PI) {
    out[0] = sinNearZero(x, 0)
    out[1] = cosNearZero(x, 0)
    return
  }
  if (!(x - x === 0)) {
    out[0] = out[1] = NaN
    return
  }
  const quadrant = reduceToQuadrant(x, reduced)
  const y = reduced[0]!
  const tail = reduced[1]!
  // Quadrants turn (s, c) into (s, c), (c, −s), (−s, −c), (−c, s): places and signs are computed, as branches here are mispredicted.
  const odd = quadrant & 1
  out[odd] = sinNearZero(y, tail) * (1 - ((quadrant + 1) & 2))
  out[odd ^ 1] = cosNearZero(y, tail) * (1 - (quadrant & 2))
}

/**
 * Sine of an angle.
 * @param x angle, rad, any finite double.
 * @returns sin x within 1 ulp, −1 to 1; x itself at ±0; NaN where x is NaN or infinite.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_sin.c.
 */
export function sin(x: number): number {
  if (x <= QUARTER_PI && x >= -QUARTER_PI) return sinNearZero(x, 0)
  if (!(x - x === 0)) return NaN
  const quadrant = reduceToQuadrant(x, reduced)
  const value = (quadrant & 1) === 1 ? cosNearZero(reduced[0]!, reduced[1]!) : sinNearZero(reduced[0]!, reduced[1]!)
  return quadrant > 1 ? -value : value
}

/**
 * Cosine of an angle.
 * @param x angle, rad, any finite double.
 * @returns cos x within 1 ulp, −1 to 1; NaN where x is NaN or infinite.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_cos.c.
 */
export function cos(x: number): number {
  if (x <= QUARTER_PI && x >= -QUARTER_PI) return cosNearZero(x, 0)
  if (!(x - x === 0)) return NaN
  const quadrant = reduceToQuadrant(x, reduced)
  const value = (quadrant & 1) === 1 ? sinNearZero(reduced[0]!, reduced[1]!) : cosNearZero(reduced[0]!, reduced[1]!)
  return quadrant === 1 || quadrant === 2 ? -value : value
}
