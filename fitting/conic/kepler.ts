/**
 * Kepler's equation for an ellipse, E − e·sin E = M.
 *
 * Symbols: M mean anomaly, E eccentric anomaly (rad), e eccentricity, 0 ≤ e < 1. One pass: the root of a cubic that approximates the
 * equation to about 1e-4, then one step of fifth order; sin E and cos E follow by turning those of the first value through the step.
 * Departures from the paper: the cube root is taken to 23 bits only (the step removes its error), and where e > 3/4 and E < 1 the
 * step works on (1 − e)·E + e·(E − sin E) − M with a series for E − sin E, so that nothing cancels as e nears 1.
 *
 * Source: Markley 1995, Kepler Equation Solver, Celestial Mechanics and Dynamical Astronomy 63, 101.
 */
import { cbrtRough, PI, reduceToQuadrant, sinCosInto, HALF_PI } from '../elementary'

const PI_SQUARED = 9.869604401089358
const ALPHA_CONSTANT = 3 * PI_SQUARED / (PI_SQUARED - 6)
const ALPHA_SLOPE = 1.6 * PI / (PI_SQUARED - 6)
const NEAR_PARABOLIC_FROM = 0.75

const direction = new Float64Array(2)
const reduced = new Float64Array(2)

/**
 * Solves Kepler's equation for an ellipse, without allocation.
 * @param meanAnomalyRad M, rad, any finite number.
 * @param eccentricity e, 0 ≤ e < 1.
 * @param out receives E (rad, of the same turn as M), sin E and cos E at [0], [1], [2]; all NaN outside the ranges.
 * Source: Markley 1995, Kepler Equation Solver, Celestial Mechanics and Dynamical Astronomy 63, 101.
 */
export function solveKeplerInto(meanAnomalyRad: number, eccentricity: number, out: Float64Array): void {
  if (!(eccentricity >= 0 && eccentricity < 1) || !(meanAnomalyRad - meanAnomalyRad === 0)) {
    out[0] = out[1] = out[2] = NaN
    return
  }
  if (meanAnomalyRad <= PI && meanAnomalyRad >= -PI) {
    solveHalfTurn(meanAnomalyRad, eccentricity, out)
    return
  }
  const m = withinHalfTurn(meanAnomalyRad)
  solveHalfTurn(m, eccentricity, out)
  out[0] = meanAnomalyRad + (out[0]! - m)
}

/** The angle reduced to −π … π by exact multiples of π/2, whatever its size. */
function withinHalfTurn(angleRad: number): number {
  const quadrant = reduceToQuadrant(angleRad, reduced)
  const turned = quadrant === 3 ? -1 : quadrant
  const angle = turned * HALF_PI + (reduced[0]! + reduced[1]!)
  return angle > PI ? angle - 2 * PI : angle
}

/** The equation for |M| ≤ π. */
function solveHalfTurn(signedM: number, e: number, out: Float64Array): void {
  const m = signedM < 0 ? -signedM : signedM
  const start = cubicStart(m, e)
  sinCosInto(start, direction)
  const s = direction[0]!
  const c = direction[1]!
  const f2 = e * s
  const f3 = e * c
  let f0 = start - f2 - m
  let f1 = 1 - f3
  if (e > NEAR_PARABOLIC_FROM && start < 1) {
    const complement = 1 - e
    f0 = complement * start + e * angleLessSine(start) - m
    f1 = complement + f2 * s / (1 + c)
  }
  const d3 = -f0 / (f1 - 0.5 * f0 * f2 / f1)
  const d4 = -f0 / (f1 + d3 * (0.5 * f2 + d3 * f3 * (1 / 6)))
  const d = -f0 / (f1 + d4 * (0.5 * f2 + d4 * (f3 * (1 / 6) - d4 * f2 * (1 / 24))))
  const dd = d * d
  const sinStep = d - d * dd * (1 / 6 - dd * (1 / 120))
  const cosDeficit = dd * (0.5 - dd * (1 / 24 - dd * (1 / 720)))
  const sine = s + (c * sinStep - s * cosDeficit)
  out[0] = signedM < 0 ? -(start + d) : start + d
  out[1] = signedM < 0 ? -sine : sine
  out[2] = c - (s * sinStep + c * cosDeficit)
}

/** First value of E for 0 ≤ M ≤ π: the real root of a cubic that fits the equation at E = 0 and E = π (Markley's eqs 15–20). */
function cubicStart(m: number, e: number): number {
  const complement = 1 - e
  const alpha = ALPHA_CONSTANT + ALPHA_SLOPE * (PI - m) / (1 + e)
  const d = 3 * complement + alpha * e
  const ad = alpha * d
  const q = 2 * ad * complement - m * m
  const r = (3 * ad * (d - complement) + m * m) * m
  const root = cbrtRough(r + Math.sqrt(q * q * q + r * r))
  const w = root * root
  return (2 * r * w / (w * w + w * q + q * q) + m) / d
}

/**
 * E − sin E by its series.
 * @param angleRad E, rad, |E| ≤ 1.
 * @returns E − sin E, rad, to a relative 2e-16.
 * Source: Taylor's series, nested.
 */
export function angleLessSine(angleRad: number): number {
  const z = angleRad * angleRad
  return angleRad * z * (1 / 6) * (1 - z * (1 / 20) * (1 - z * (1 / 42) * (1 - z * (1 / 72) * (1 - z * (1 / 110) * (1 - z * (1 / 156) * (1 - z * (1 / 210) * (1 - z * (1 / 272))))))))
}

const solution = new Float64Array(3)

/**
 * Eccentric anomaly of an ellipse.
 * @param meanAnomalyRad M, rad, any finite number.
 * @param eccentricity e, 0 ≤ e < 1.
 * @returns E, rad, of the same turn as M; NaN outside the ranges.
 * Source: Markley 1995, Kepler Equation Solver, Celestial Mechanics and Dynamical Astronomy 63, 101.
 */
export function eccentricAnomalyRad(meanAnomalyRad: number, eccentricity: number): number {
  solveKeplerInto(meanAnomalyRad, eccentricity, solution)
  return solution[0]!
}
