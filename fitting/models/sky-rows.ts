/**
 * Whitened residual rows (computed minus observed) of measures on the sky.
 *   pair     W ((x, y) − (xₒ, yₒ)): radial and transverse, or north and east; W the inverse Cholesky factor of the measure's
 *            2 × 2 covariance. For θ, ρ the transverse error is ρ σ_θ, with ρ first as observed, later as computed.
 *   wrapped  (ρ − ρₒ, Δθ): where σ_θ > 5°, as the radial row above is biased by −σ_θ²/2.
 *   theta, rho  one row each.
 * Ambiguous quadrants take the nearer of θ and θ + 180°. x north, y east, arcsec.
 * Source: whitening by the Cholesky factor: Golub & Van Loan, Matrix Computations (1996) (common practice); the choice of rows is ours.
 */
import { atan2, cos, PI, sin } from '../elementary'
import { wrapToHalfTurn } from './relative-kepler'
import type { SkyMeasure } from './sky-measure'

const LARGEST_LINEAR_SIGMA_RAD = (5 * PI) / 180

/** Inverse of the Cholesky factor of [[a², c a b], [c a b, b²]] as (l₁₁, l₂₁, l₂₂). */
function whitening(a: number, b: number, correlation: number, weight: number): [number, number, number] {
  const rest = Math.sqrt(1 - correlation * correlation)
  const root = Math.sqrt(weight)
  return [root / a, (-root * correlation) / (a * rest), root / (b * rest)]
}

const weightOf = (measure: SkyMeasure) => measure.weight * measure.robustWeight

type Form = 'pair' | 'wrapped' | 'theta' | 'rho'

/** One measure ready to give its rows. */
export interface SkyRow {
  readonly measure: SkyMeasure
  readonly form: Form
  readonly rows: 1 | 2
  /** Whitening: r₁ = w₁₁ d₁ + w₁₂ d₂, r₂ = w₂₁ d₁ + w₂₂ d₂ with d in (x, y) for pair, in (ρ, θ) for wrapped. */
  readonly w11: number
  readonly w12: number
  readonly w21: number
  readonly w22: number
  readonly xo: number
  readonly yo: number
}

function polarPair(measure: SkyMeasure, weighRhoArcsec: number): SkyRow {
  const { thetaRad, rhoArcsec, sigmaAlong, sigmaThetaRad, correlation } = measure
  const floor = Math.max(weighRhoArcsec, sigmaAlong)
  const [l11, l21, l22] = whitening(sigmaAlong, floor * sigmaThetaRad, correlation, weightOf(measure))
  const c = cos(thetaRad)
  const s = sin(thetaRad)
  return {
    measure, form: 'pair', rows: 2,
    w11: l11 * c, w12: l11 * s, w21: l21 * c - l22 * s, w22: l21 * s + l22 * c,
    xo: rhoArcsec * c, yo: rhoArcsec * s,
  }
}

function single(measure: SkyMeasure, form: 'theta' | 'rho'): SkyRow {
  const sigma = form === 'theta' ? measure.sigmaThetaRad : measure.sigmaAlong
  return { measure, form, rows: 1, w11: Math.sqrt(weightOf(measure)) / sigma, w12: 0, w21: 0, w22: 0, xo: 0, yo: 0 }
}

/**
 * Prepares the rows of one measure.
 * @param measure with its errors resolved.
 * @param weighRhoArcsec ρ that turns σ_θ into a transverse error, arcsec; a measure's own ρ at first, the computed one later.
 * @returns the row pair or single row.
 */
export function skyRow(measure: SkyMeasure, weighRhoArcsec: number): SkyRow {
  if (measure.form === 'theta' || measure.form === 'rho') return single(measure, measure.form)
  if (measure.form === 'rectangular') {
    const [l11, l21, l22] = whitening(measure.sigmaNorth, measure.sigmaEast, measure.correlation, weightOf(measure))
    return { measure, form: 'pair', rows: 2, w11: l11, w12: 0, w21: l21, w22: l22, xo: measure.north, yo: measure.east }
  }
  if (measure.sigmaThetaRad <= LARGEST_LINEAR_SIGMA_RAD) return polarPair(measure, weighRhoArcsec)
  const [l11, l21, l22] = whitening(measure.sigmaAlong, measure.sigmaThetaRad, measure.correlation, weightOf(measure))
  return { measure, form: 'wrapped', rows: 2, w11: l11, w12: 0, w21: l21, w22: l22, xo: 0, yo: 0 }
}

/**
 * Rows that are linear in the position, for the search: the pair also where σ_θ > 5°, and for a position angle alone the transverse
 * row (−x sin θ + y cos θ) / (ρ σ_θ).
 * @param measure any form but a separation alone.
 * @param rhoArcsec ρ that turns σ_θ into a transverse error, arcsec.
 * @returns a row with W and the observed place (0, 0 for a position angle alone).
 */
export function linearSkyRow(measure: SkyMeasure, rhoArcsec: number): SkyRow {
  if (measure.form === 'polar') return polarPair(measure, rhoArcsec)
  if (measure.form !== 'theta') return skyRow(measure, rhoArcsec)
  const scale = Math.sqrt(weightOf(measure)) / (rhoArcsec * measure.sigmaThetaRad)
  return {
    measure, form: 'pair', rows: 1, w11: -sin(measure.thetaRad) * scale, w12: cos(measure.thetaRad) * scale, w21: 0, w22: 0, xo: 0, yo: 0,
  }
}

/** Receives a measure's rows and their derivatives by x and y. */
export interface RowBuffer {
  r1: number
  r2: number
  r1x: number
  r1y: number
  r2x: number
  r2y: number
}

/** A fresh buffer for evaluateRow. */
export function rowBuffer(): RowBuffer {
  return { r1: 0, r2: 0, r1x: 0, r1y: 0, r2x: 0, r2y: 0 }
}

/** Δθ of computed minus observed: within ±180°, or ±90° where the quadrant is ambiguous. */
function thetaDifference(row: SkyRow, x: number, y: number): number {
  const difference = atan2(y, x) - row.measure.thetaRad
  return row.measure.isAmbiguous ? wrapToHalfTurn(2 * difference) / 2 : wrapToHalfTurn(difference)
}

function evaluatePair(row: SkyRow, x: number, y: number, out: RowBuffer): void {
  const sign = row.measure.isAmbiguous && x * row.xo + y * row.yo < 0 ? -1 : 1
  const dx = sign * x - row.xo
  const dy = sign * y - row.yo
  out.r1 = row.w11 * dx + row.w12 * dy
  out.r2 = row.w21 * dx + row.w22 * dy
  out.r1x = sign * row.w11
  out.r1y = sign * row.w12
  out.r2x = sign * row.w21
  out.r2y = sign * row.w22
}

/**
 * Rows of one measure at a computed position.
 * @param row as prepared by skyRow.
 * @param x north, arcsec.
 * @param y east, arcsec.
 * @param out receives the rows; r2 and its derivatives are 0 for a single row.
 * @returns false where the position is at the primary itself and the row needs its direction.
 */
export function evaluateRow(row: SkyRow, x: number, y: number, out: RowBuffer): boolean {
  if (row.form === 'pair') {
    evaluatePair(row, x, y, out)
    return true
  }
  const rho2 = x * x + y * y
  if (!(rho2 > 0)) return false
  const rho = Math.sqrt(rho2)
  const isTheta = row.form === 'theta'
  const along = isTheta ? thetaDifference(row, x, y) : rho - row.measure.rhoArcsec
  const alongX = isTheta ? -y / rho2 : x / rho
  const alongY = isTheta ? x / rho2 : y / rho
  out.r1 = row.w11 * along
  out.r1x = row.w11 * alongX
  out.r1y = row.w11 * alongY
  out.r2 = out.r2x = out.r2y = 0
  if (row.form !== 'wrapped') return true
  out.r2 = row.w21 * along + row.w22 * thetaDifference(row, x, y)
  out.r2x = row.w21 * alongX - (row.w22 * y) / rho2
  out.r2y = row.w21 * alongY + (row.w22 * x) / rho2
  return true
}
