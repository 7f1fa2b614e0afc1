/**
 * Stumpff's functions, one set of formulas for ellipse, parabola and hyperbola.
 *   cₙ(x) = 1/n! − x/(n+2)! + x²/(n+4)! − …,  cₙ = 1/n! − x·cₙ₊₂
 *   x > 0: c₀ = cos √x, c₁ = sin √x/√x;  x < 0: c₀ = cosh √−x, c₁ = sinh √−x/√−x
 * Source: Stumpff 1959, Himmelsmechanik I; Battin 1999, An Introduction to the Mathematics and Methods of Astrodynamics, ch. 4.
 */
import { exp, sinCosInto } from '../elementary'

/** Up to this |x| the series of c₄ and c₅ is summed; their 13 terms then leave less than 1e-18. */
const SERIES_UP_TO = 2.5
const TERMS = 13
const BY_FOUR = Float64Array.from({ length: TERMS }, (_, k) => 1 / ((2 * k + 5) * (2 * k + 6)))
const BY_FIVE = Float64Array.from({ length: TERMS }, (_, k) => 1 / ((2 * k + 6) * (2 * k + 7)))
const turn = new Float64Array(2)

/**
 * c₀ to c₅.
 * @param x αχ², any number; below about −490000 the functions overflow.
 * @param out takes six values; Infinity or NaN where they overflow.
 * Source: Battin 1999, Mathematics and Methods of Astrodynamics, ch. 4.
 */
export function stumpffInto(x: number, out: Float64Array): void {
  if (Math.abs(x) <= SERIES_UP_TO) {
    seriesInto(x, out)
    return
  }
  const s = Math.sqrt(Math.abs(x))
  if (x > 0) {
    sinCosInto(s, turn)
    out[0] = turn[1]!
    out[1] = turn[0]! / s
  } else {
    const grown = exp(s)
    out[0] = 0.5 * (grown + 1 / grown)
    out[1] = 0.5 * (grown - 1 / grown) / s
  }
  out[2] = (1 - out[0]!) / x
  out[3] = (1 - out[1]!) / x
  out[4] = (0.5 - out[2]!) / x
  out[5] = (1 / 6 - out[3]!) / x
}

function seriesInto(x: number, out: Float64Array): void {
  let four = 1
  let five = 1
  for (let k = TERMS - 1; k >= 0; k--) {
    four = 1 - x * BY_FOUR[k]! * four
    five = 1 - x * BY_FIVE[k]! * five
  }
  out[5] = five / 120
  out[4] = four / 24
  out[3] = 1 / 6 - x * out[5]!
  out[2] = 0.5 - x * out[4]!
  out[1] = 1 - x * out[3]!
  out[0] = 1 - x * out[2]!
}
