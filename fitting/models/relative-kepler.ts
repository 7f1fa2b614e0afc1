/**
 * The relative orbit of a double star in parameters that stay regular at e = 0 and at i = 0 or 180°.
 *   values = (ln P, u, v, A₁, B₁, F₁, G₁),  s = |(u, v)| ≤ 5,  e = tanh s,  ϖ = atan2(v, u),  k = e cos ϖ,  h = e sin ϖ
 *   λ = 2π (t − t_ref)/P = K − k sin K + h cos K,  K = E + ϖ,  β = 1/(1 + √(1 − e²))
 *   X = (1 − h²β) cos K + hkβ sin K − k,   Y = (1 − k²β) sin K + hkβ cos K − h
 *   x = A₁X + F₁Y (north),   y = B₁X + G₁Y (east)
 * (X, Y) is the unit orbit turned by ϖ, so A₁ … G₁ are the Thiele–Innes constants turned back by ϖ. Bound by construction.
 * Source: Thiele–Innes constants: Innes 1926, van den Bos 1926 (Union Obs. Circ. 68); equinoctial k, h: Broucke & Cefola 1972,
 * Celestial Mechanics 5, 303; e = tanh s is ours.
 */
import { atan2, exp, PI, sinCosInto, tanh, TWO_PI } from '../elementary'
import { solveKeplerInto } from '../conic/kepler'
import type { SkyPath } from './sky-path'

/** Names of the regular parameters, in order. */
export const RELATIVE_KEPLER_NAMES = ['lnPeriod', 'u', 'v', 'A1', 'B1', 'F1', 'G1'] as const
/** Beyond this |(u, v)| (e = 0.99991) the path is not defined. */
export const LARGEST_S = 5

/** Shape of the orbit: e, ϖ, k, h and their derivatives along (u, v). */
export interface Shape {
  eccentricity: number
  varpiRad: number
  k: number
  h: number
  dkdu: number
  dkdv: number
  dhdu: number
  dhdv: number
}

/**
 * Eccentricity and direction of periastron from (u, v).
 * @param u e = tanh |(u, v)|, any finite value.
 * @param v as u.
 * @returns the shape with derivatives that are smooth through e = 0.
 */
export function shapeOf(u: number, v: number): Shape {
  const s2 = u * u + v * v
  const s = Math.sqrt(s2)
  const eccentricity = tanh(s)
  const sech2 = 1 - eccentricity * eccentricity
  const small = s < 1e-3
  const g = small ? 1 - s2 * (1 / 3 - (2 / 15) * s2) : eccentricity / s
  const slope = small ? -2 / 3 + (8 / 15) * s2 : (sech2 - g) / s2
  return {
    eccentricity,
    varpiRad: s > 0 ? atan2(v, u) : 0,
    k: u * g,
    h: v * g,
    dkdu: g + u * u * slope,
    dkdv: u * v * slope,
    dhdu: u * v * slope,
    dhdv: g + v * v * slope,
  }
}

/** The unit orbit turned by ϖ at given (P, u, v): position, and derivatives by (ln P, u, v). */
export class TurnedOrbit {
  X = 0
  Y = 0
  /** ∂X and ∂Y by ln P, u, v. */
  readonly partials = new Float64Array(6)
  private shape: Shape = shapeOf(0, 0)
  private frequency = 1
  private beta = 0.5
  private betaSlope = 0.25
  private cosVarpi = 1
  private sinVarpi = 0
  private readonly angle = new Float64Array(2)
  private readonly kepler = new Float64Array(3)

  /** @param referenceEpochYr t_ref, Julian year. */
  constructor(private readonly referenceEpochYr: number) {}

  /** Takes (ln P, u, v); false where |(u, v)| > 5 or P is not finite. */
  prepare(lnPeriod: number, u: number, v: number): boolean {
    if (!(u * u + v * v <= LARGEST_S * LARGEST_S) || !(Math.abs(lnPeriod) < 60)) return false
    this.shape = shapeOf(u, v)
    this.frequency = exp(-lnPeriod)
    const w = Math.sqrt(1 - this.shape.eccentricity * this.shape.eccentricity)
    this.beta = 1 / (1 + w)
    this.betaSlope = (this.beta * this.beta) / w
    sinCosInto(this.shape.varpiRad, this.angle)
    this.sinVarpi = this.angle[0]!
    this.cosVarpi = this.angle[1]!
    return true
  }

  /** Sets X, Y (and the partials) at an epoch, Julian year. */
  at(epochYr: number, withPartials: boolean): void {
    const { eccentricity, varpiRad, k, h } = this.shape
    const turns = (epochYr - this.referenceEpochYr) * this.frequency
    const phase = turns - varpiRad / TWO_PI
    solveKeplerInto((phase - Math.round(phase)) * TWO_PI, eccentricity, this.kepler)
    const sinE = this.kepler[1]!
    const cosE = this.kepler[2]!
    const c = cosE * this.cosVarpi - sinE * this.sinVarpi
    const s = sinE * this.cosVarpi + cosE * this.sinVarpi
    const b = this.beta
    const hkb = h * k * b
    this.X = (1 - h * h * b) * c + hkb * s - k
    this.Y = (1 - k * k * b) * s + hkb * c - h
    if (withPartials) this.differentiate(turns, c, s)
  }

  private differentiate(turns: number, c: number, s: number): void {
    const { k, h, dkdu, dkdv, dhdu, dhdv } = this.shape
    const b = this.beta
    const bk = this.betaSlope * k
    const bh = this.betaSlope * h
    const hkb = h * k * b
    const inverseD = 1 / (1 - k * c - h * s)
    const XK = (hkb * c - (1 - h * h * b) * s) * inverseD
    const YK = ((1 - k * k * b) * c - hkb * s) * inverseD
    const Xk = (h * b + h * k * bk) * s - h * h * bk * c - 1 + XK * s
    const Xh = (k * b + h * k * bh) * s - (2 * h * b + h * h * bh) * c - XK * c
    const Yk = (h * b + h * k * bk) * c - (2 * k * b + k * k * bk) * s + YK * s
    const Yh = (k * b + h * k * bh) * c - k * k * bh * s - 1 - YK * c
    const { partials } = this
    const lambda = turns * TWO_PI
    partials[0] = -lambda * XK
    partials[1] = Xk * dkdu + Xh * dhdu
    partials[2] = Xk * dkdv + Xh * dhdv
    partials[3] = -lambda * YK
    partials[4] = Yk * dkdu + Yh * dhdu
    partials[5] = Yk * dkdv + Yh * dhdv
  }
}

/**
 * The Kepler path on the sky.
 * @param referenceEpochYr t_ref, Julian year; mid-arc keeps period and phase least correlated.
 * @returns a path with the parameters of RELATIVE_KEPLER_NAMES.
 */
export function keplerPath(referenceEpochYr: number): SkyPath {
  const orbit = new TurnedOrbit(referenceEpochYr)
  let A = 0
  let B = 0
  let F = 0
  let G = 0
  return {
    parameters: 7,
    prepare(values) {
      A = values[3]!
      B = values[4]!
      F = values[5]!
      G = values[6]!
      return orbit.prepare(values[0]!, values[1]!, values[2]!)
    },
    at(epochYr, out, withPartials) {
      orbit.at(epochYr, withPartials)
      const { X, Y, partials } = orbit
      out[0] = A * X + F * Y
      out[1] = B * X + G * Y
      if (!withPartials) return
      for (let j = 0; j < 3; j++) {
        out[2 + j] = A * partials[j]! + F * partials[3 + j]!
        out[9 + j] = B * partials[j]! + G * partials[3 + j]!
      }
      out[5] = out[13] = X
      out[7] = out[15] = Y
      out[6] = out[8] = out[12] = out[14] = 0
    },
  }
}

/**
 * Brings an angle into (−π, π].
 * @param angleRad any finite angle, rad.
 * @returns the same direction in (−π, π].
 */
export function wrapToHalfTurn(angleRad: number): number {
  const wrapped = angleRad - TWO_PI * Math.round(angleRad / TWO_PI)
  return wrapped <= -PI ? wrapped + TWO_PI : wrapped
}
