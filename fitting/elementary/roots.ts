/** Length of a plane vector and the real cube root. */
import { highWord, withHighWord } from './float-bits'

/** 2⁶⁰⁰ and its inverse: exact scaling where the squares would leave the range of doubles. */
const HUGE_SCALE = 4.149515568880993e180
const TINY_SCALE = 2.409919865102884e-181
const SQUARES_FIT_ABOVE = 1e-140
const SQUARES_FIT_BELOW = 1e150
/** 2²⁷ + 1: Dekker's constant, cuts a double into two halves. */
const SPLITTER = 134217729

/**
 * √(x² + y²) without early overflow or underflow.
 * @param x any double.
 * @param y any double.
 * @returns the length within 1 ulp, ≥ 0; Infinity where either is infinite; NaN where either is NaN.
 * Source: Borges 2019, An improved algorithm for hypot(a, b), with Dekker's product in place of a fused operation.
 */
export function hypot(x: number, y: number): number {
  const ax = x < 0 ? -x : x
  const ay = y < 0 ? -y : y
  const a = ax < ay ? ay : ax
  const b = ax < ay ? ax : ay
  if (a === Infinity || b === Infinity) return Infinity
  if (!(b > 0)) return a + b
  if (a > SQUARES_FIT_BELOW) return HUGE_SCALE * correctedLength(a * TINY_SCALE, b * TINY_SCALE)
  if (a < SQUARES_FIT_ABOVE) return TINY_SCALE * correctedLength(a * HUGE_SCALE, b * HUGE_SCALE)
  return correctedLength(a, b)
}

/** The square root of the rounded sum, corrected by its residual h² − a² − b²; a ≥ b > 0. */
function correctedLength(a: number, b: number): number {
  const aa = a * a
  const bb = b * b
  const h = Math.sqrt(aa + bb)
  const hh = h * h
  const residual = ((hh - aa) - bb) + (squareError(h, hh) - squareError(a, aa) - squareError(b, bb))
  return h - residual / (2 * h)
}

/** a² − fl(a²), exactly. */
function squareError(a: number, square: number): number {
  const c = SPLITTER * a
  const high = c - (c - a)
  const low = a - high
  return ((high * high - square) + 2 * high * low) + low * low
}

const B1 = 715094163
const B2 = 696219795
const P0 = 1.87595182427177009643
const P1 = -1.88497979543377169875
const P2 = 1.621429720105354466
const P3 = -0.758397934778766047437
const P4 = 0.145996192886612446982
const TWO_54 = 18014398509481984
/** 2³⁰ + 1: leaves 23 bits, so that the square is exact. */
const TO_23_BITS = 1073741825

/**
 * Real cube root.
 * @param x any double.
 * @returns ∛x within 1 ulp, with the sign of x; x itself at ±0 and ±Infinity; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_cbrt.c, polynomial of its FreeBSD revision.
 */
export function cbrt(x: number): number {
  const a = Math.abs(x)
  if (a === 0 || !(a < Infinity)) return x
  let t = a < 2.2250738585072014e-308
    ? withHighWord(0, Math.floor((highWord(a * TWO_54) & 0x7FFFFFFF) / 3) + B2)
    : withHighWord(0, Math.floor(highWord(a) / 3) + B1)
  const r = (t * t) * (t / a)
  t *= (P0 + r * (P1 + r * P2)) + ((r * r) * r) * (P3 + r * P4)
  const c = TO_23_BITS * t
  t = c - (c - t)
  const quotient = a / (t * t)
  t += t * ((quotient - t) / (t + t + quotient))
  return x < 0 ? -t : t
}

/**
 * Cube root to 23 bits, for starting values that are polished afterwards.
 * @param x normal positive double (≥ 2.3e-308), finite.
 * @returns ∛x within a relative 2e-7; NaN for NaN.
 * Source: fdlibm 5.3 (Sun Microsystems 1993), s_cbrt.c, polynomial of its FreeBSD revision.
 */
export function cbrtRough(x: number): number {
  const t = withHighWord(0, Math.floor(highWord(x) / 3) + B1)
  const r = (t * t) * (t / x)
  return t * ((P0 + r * (P1 + r * P2)) + ((r * r) * r) * (P3 + r * P4))
}
