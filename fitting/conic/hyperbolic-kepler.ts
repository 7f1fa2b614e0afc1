/**
 * Kepler's equation for a hyperbola, e·sinh H − H = M, and Barker's equation for a parabola, s + s³/3 = M.
 *
 * Symbols: M mean anomaly (rad; for the parabola √(μ/2q³)·(t − T)), H hyperbolic anomaly (rad), e > 1 eccentricity,
 * s = tan(ν/2). The hyperbolic equation is convex for H > 0; from an upper bound of its root, steps of Newton's method corrected
 * to fourth order fall to the root without overshooting far. For H < 1 the equation is written (e − 1)·H + e·(sinh H − H) = M,
 * so that nothing cancels as e nears 1.
 *
 * Sources: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6; Meeus 1998, Astronomical Algorithms, ch. 34 (parabola).
 */
import { asinh, cbrt, cosh, hypot, sinh } from '../elementary'

const MOST_STEPS = 50
const SETTLED = 2e-16
const LARGE = 1e6

/**
 * Hyperbolic anomaly.
 * @param meanAnomalyRad M, rad, any finite number.
 * @param eccentricity e, > 1, finite.
 * @returns H, rad, with the sign of M; NaN outside the ranges.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function hyperbolicAnomalyRad(meanAnomalyRad: number, eccentricity: number): number {
  if (!(eccentricity > 1 && eccentricity < Infinity) || !(meanAnomalyRad - meanAnomalyRad === 0)) return NaN
  if (meanAnomalyRad === 0) return meanAnomalyRad
  const m = Math.abs(meanAnomalyRad)
  const e = eccentricity
  let h = upperBound(m, e)
  for (let n = 0; n < MOST_STEPS; n++) {
    const step = fourthOrderStep(h, m, e)
    h += step
    if (Math.abs(step) <= SETTLED * h) break
  }
  return meanAnomalyRad < 0 ? -h : h
}

/** H from above: the cubic (e − 1)·H + e·H³/6 = M has the larger root, as sinh H ≥ H + H³/6; then H = asinh((M + H)/e) once. */
function upperBound(m: number, e: number): number {
  if (m > LARGE * e) return asinh(2 * (m / e))
  const p = 2 * (e - 1) / e
  const q = 3 * m / e
  const s = cbrt(q + Math.sqrt(q * q + p * p * p))
  const t = p / s
  const root = 2 * q / (s * s + p + t * t)
  return Math.min(root, asinh((m + root) / e))
}

function fourthOrderStep(h: number, m: number, e: number): number {
  const f2 = e * sinh(h)
  const f3 = e * cosh(h)
  const complement = e - 1
  const f0 = h < 1 ? complement * h + e * sinhLessAngle(h) - m : f2 - h - m
  const f1 = h < 1 ? complement + e * coshLessOne(h) : f3 - 1
  const newton = -f0 / f1
  const halley = -f0 / (f1 + 0.5 * newton * f2)
  return -f0 / (f1 + 0.5 * halley * f2 + halley * halley * f3 / 6)
}

/** cosh H − 1 = 2 sinh²(H/2). */
function coshLessOne(h: number): number {
  const s = sinh(0.5 * h)
  return 2 * s * s
}

/**
 * sinh H − H by its series.
 * @param angleRad H, rad, |H| ≤ 1.
 * @returns sinh H − H, rad, to a relative 2e-16.
 * Source: Taylor's series, nested.
 */
export function sinhLessAngle(angleRad: number): number {
  const z = angleRad * angleRad
  return angleRad * z * (1 / 6) * (1 + z * (1 / 20) * (1 + z * (1 / 42) * (1 + z * (1 / 72) * (1 + z * (1 / 110) * (1 + z * (1 / 156) * (1 + z * (1 / 210) * (1 + z * (1 / 272))))))))
}

/**
 * Solves Barker's equation s + s³/3 = M.
 * @param meanAnomalyRad √(μ/(2q³))·(t − T), rad, any finite number.
 * @returns s = tan(ν/2), dimensionless, with the sign of M; NaN where M is not finite.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 34; Cardano's root without cancellation.
 */
export function solveBarker(meanAnomalyRad: number): number {
  if (!(meanAnomalyRad - meanAnomalyRad === 0)) return NaN
  const q = 1.5 * Math.abs(meanAnomalyRad)
  const c = cbrt(q + hypot(q, 1))
  const s = 2 * q / (c * c + 1 + 1 / (c * c))
  return meanAnomalyRad < 0 ? -s : s
}
