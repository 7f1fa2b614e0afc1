/**
 * Anomalies of every conic.
 *
 * Symbols: M mean anomaly (rad), ν true anomaly (rad), e eccentricity. The mean anomaly is n·(t − T) with n = √(μ/|a|³) for ellipse and
 * hyperbola and n = √(μ/2q³) for the parabola. The auxiliary anomaly is E (ellipse), s = tan(ν/2) (parabola) or H (hyperbola):
 *   tan(ν/2) = √((1+e)/(1−e))·tan(E/2) = s = √((e+1)/(e−1))·tanh(H/2)
 *
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
import { atan, atan2, atanh, cos, sin, sinh, tanh, TWO_PI } from '../elementary'
import { hyperbolicAnomalyRad, sinhLessAngle, solveBarker } from './hyperbolic-kepler'
import { angleLessSine, eccentricAnomalyRad } from './kepler'

const SQRT_HALF = 0.7071067811865476

/**
 * True anomaly of an ellipse from its eccentric anomaly.
 * @param eccentricRad E, rad, any finite number.
 * @param eccentricity e, 0 ≤ e < 1.
 * @returns ν, rad, of the same turn as E.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function trueFromEccentricRad(eccentricRad: number, eccentricity: number): number {
  const turns = Math.floor(eccentricRad / TWO_PI + 0.5)
  const half = 0.5 * eccentricRad
  const sign = turns % 2 === 0 ? 1 : -1
  const within = 2 * atan2(sign * Math.sqrt(1 + eccentricity) * sin(half), sign * Math.sqrt(1 - eccentricity) * cos(half))
  return within + turns * TWO_PI
}

/**
 * Eccentric anomaly of an ellipse from its true anomaly.
 * @param trueRad ν, rad, any finite number.
 * @param eccentricity e, 0 ≤ e < 1.
 * @returns E, rad, of the same turn as ν.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function eccentricFromTrueRad(trueRad: number, eccentricity: number): number {
  const turns = Math.floor(trueRad / TWO_PI + 0.5)
  const half = 0.5 * trueRad
  const sign = turns % 2 === 0 ? 1 : -1
  const within = 2 * atan2(sign * Math.sqrt(1 - eccentricity) * sin(half), sign * Math.sqrt(1 + eccentricity) * cos(half))
  return within + turns * TWO_PI
}

/**
 * Mean anomaly of any conic from its true anomaly.
 * @param trueRad ν, rad; for e ≥ 1 within the branch, 1 + e·cos ν > 0.
 * @param eccentricity e, ≥ 0.
 * @returns M, rad (ellipse: of the same turn as ν); NaN where the direction is not on the conic.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function meanFromTrueRad(trueRad: number, eccentricity: number): number {
  if (eccentricity < 1) {
    const eccentric = eccentricFromTrueRad(trueRad, eccentricity)
    if (Math.abs(eccentric) <= 1) return (1 - eccentricity) * eccentric + eccentricity * angleLessSine(eccentric)
    return eccentric - eccentricity * sin(eccentric)
  }
  if (!(1 + eccentricity * cos(trueRad) > 0)) return NaN
  const tangent = sin(0.5 * trueRad) / cos(0.5 * trueRad)
  if (eccentricity === 1) return tangent + tangent * tangent * tangent / 3
  const h = 2 * atanh(Math.sqrt((eccentricity - 1) / (eccentricity + 1)) * tangent)
  if (Math.abs(h) <= 1) return (eccentricity - 1) * h + eccentricity * sinhLessAngle(h)
  return eccentricity * sinh(h) - h
}

/**
 * True anomaly of any conic from its mean anomaly.
 * @param meanRad M, rad, any finite number.
 * @param eccentricity e, ≥ 0.
 * @returns ν, rad (ellipse: of the same turn as M; else between the asymptotes); NaN outside the ranges.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function trueFromMeanRad(meanRad: number, eccentricity: number): number {
  if (eccentricity < 1) return trueFromEccentricRad(eccentricAnomalyRad(meanRad, eccentricity), eccentricity)
  if (eccentricity === 1) return 2 * atan(solveBarker(meanRad))
  const h = hyperbolicAnomalyRad(meanRad, eccentricity)
  return 2 * atan(Math.sqrt((eccentricity + 1) / (eccentricity - 1)) * tanh(0.5 * h))
}

/** Place on a conic: true anomaly, rad, and distance from the focus, in the unit of q. */
export interface ConicPlace {
  trueAnomalyRad: number
  radius: number
}

/** Size and shape of a conic with its central mass. */
export interface ConicMotion {
  /** Distance q of the periapsis, > 0, in any unit of length. */
  periapsisDistance: number
  /** e, ≥ 0. */
  eccentricity: number
  /** μ, > 0, in (unit of q)³ per (unit of time)². */
  gravitationalParameter: number
}

/**
 * Mean motion of any conic: M = n·(t − T).
 * @param motion q, e and μ.
 * @returns n, rad per unit of time of μ: √(μ/|a|³), or √(μ/2q³) for the parabola.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function meanMotion(motion: ConicMotion): number {
  const { periapsisDistance: q, eccentricity: e, gravitationalParameter } = motion
  const circular = Math.sqrt(gravitationalParameter / q) / q
  const complement = Math.abs(1 - e)
  return e === 1 ? circular * SQRT_HALF : circular * complement * Math.sqrt(complement)
}

/**
 * Place on any conic at a time.
 * @param motion q, e and μ.
 * @param timeSincePeriapsis t − T, in the unit of time of μ, any finite number.
 * @returns ν and r; NaN outside the ranges.
 * Source: Danby 1988, Fundamentals of Celestial Mechanics, ch. 6.
 */
export function placeAtTime(motion: ConicMotion, timeSincePeriapsis: number): ConicPlace {
  const trueAnomalyRad = trueFromMeanRad(meanMotion(motion) * timeSincePeriapsis, motion.eccentricity)
  return { trueAnomalyRad, radius: radiusAtTrue(motion.periapsisDistance, motion.eccentricity, trueAnomalyRad) }
}

/**
 * Distance from the focus on any conic, r = q·(1 + e)/(1 + e·cos ν), with the denominator as (1 + e)·cos²(ν/2) + (1 − e)·sin²(ν/2).
 * @param periapsisDistance q, > 0, in any unit of length.
 * @param eccentricity e, ≥ 0.
 * @param trueRad ν, rad.
 * @returns r in the unit of q; negative beyond the asymptotes of a hyperbola.
 * Source: definition of a conic by focus and directrix.
 */
export function radiusAtTrue(periapsisDistance: number, eccentricity: number, trueRad: number): number {
  const c = cos(0.5 * trueRad)
  const s = sin(0.5 * trueRad)
  return periapsisDistance * (1 + eccentricity) / ((1 + eccentricity) * c * c + (1 - eccentricity) * s * s)
}
