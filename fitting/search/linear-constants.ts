/**
 * The linear part of a relative orbit: with the unit orbit (X, Y) given, x = A X + F Y and y = B X + G Y are fitted by normal
 * equations in (A, F, B, G).
 * Source: Hartkopf, McAlister & Franz 1989, AJ 98, 1014 (linear constants inside a search over P, e, T).
 */

/** Sums of one configuration; the names say which products are summed over the measures. */
export interface LinearSums {
  m11XX: number
  m11XY: number
  m11YY: number
  m12XX: number
  m12XY: number
  m12YY: number
  m22XX: number
  m22XY: number
  m22YY: number
  v1X: number
  v1Y: number
  v2X: number
  v2Y: number
}

/** A pivot below this part of its diagonal adds nothing: the configuration does not determine that constant. */
const PIVOT_FLOOR = 1e-11

/**
 * Cholesky factor of the 4 × 4 normal matrix and the forward-substituted right side.
 * @param sums of a configuration.
 * @param out 14 entries: L by rows (l11, l21, l22, l31, l32, l33, l41 … l44), then z = L⁻¹ b.
 * @returns the fall of χ², |z|².
 */
export function factorLinear(sums: LinearSums, out: Float64Array): number {
  const l11 = Math.sqrt(sums.m11XX)
  const i11 = l11 > 0 ? 1 / l11 : 0
  const l21 = sums.m11XY * i11
  const l31 = sums.m12XX * i11
  const l41 = sums.m12XY * i11
  const d2 = sums.m11YY - l21 * l21
  const l22 = d2 > PIVOT_FLOOR * sums.m11YY ? Math.sqrt(d2) : 0
  const i22 = l22 > 0 ? 1 / l22 : 0
  const l32 = (sums.m12XY - l31 * l21) * i22
  const l42 = (sums.m12YY - l41 * l21) * i22
  const d3 = sums.m22XX - l31 * l31 - l32 * l32
  const l33 = d3 > PIVOT_FLOOR * sums.m22XX ? Math.sqrt(d3) : 0
  const i33 = l33 > 0 ? 1 / l33 : 0
  const l43 = (sums.m22XY - l41 * l31 - l42 * l32) * i33
  const d4 = sums.m22YY - l41 * l41 - l42 * l42 - l43 * l43
  const l44 = d4 > PIVOT_FLOOR * sums.m22YY ? Math.sqrt(d4) : 0
  const i44 = l44 > 0 ? 1 / l44 : 0
  const z1 = sums.v1X * i11
  const z2 = (sums.v1Y - l21 * z1) * i22
  const z3 = (sums.v2X - l31 * z1 - l32 * z2) * i33
  const z4 = (sums.v2Y - l41 * z1 - l42 * z2 - l43 * z3) * i44
  out[0] = i11
  out[1] = l21
  out[2] = i22
  out[3] = l31
  out[4] = l32
  out[5] = i33
  out[6] = l41
  out[7] = l42
  out[8] = l43
  out[9] = i44
  out[10] = z1
  out[11] = z2
  out[12] = z3
  out[13] = z4
  return z1 * z1 + z2 * z2 + z3 * z3 + z4 * z4
}

/**
 * Back substitution.
 * @param factored as left by factorLinear (inverse pivots on the diagonal).
 * @param out receives A, F, B, G.
 */
export function solveLinear(factored: Float64Array, out: Float64Array): void {
  const G = factored[13]! * factored[9]!
  const B = (factored[12]! - factored[8]! * G) * factored[5]!
  const F = (factored[11]! - factored[4]! * B - factored[7]! * G) * factored[2]!
  const A = (factored[10]! - factored[1]! * F - factored[3]! * B - factored[6]! * G) * factored[0]!
  out[0] = A
  out[1] = F
  out[2] = B
  out[3] = G
}
