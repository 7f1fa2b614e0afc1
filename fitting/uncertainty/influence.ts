/**
 * What one measure does to a fit, in block form for measures of one or two rows.
 *   H_i = J_i C J_iᵀ,  leverage = tr H_i,  D_i = r_iᵀ (I − H_i)⁻¹ H_i (I − H_i)⁻¹ r_i / (p s²)
 * J_i and r_i whitened, C of unit variance, p parameters, s² = χ²/ν.
 * Source: Cook 1977, Technometrics 19, 15; block form: Cook & Weisberg 1982, Residuals and Influence in Regression, 3.6.
 */
import { quadraticForm } from './error-scale'

export interface Influence {
  leverage: number
  /** null where the measure alone fixes a parameter (I − H singular) or s² is not known. */
  cook: number | null
}

export interface InfluenceRows {
  /** One or two whitened residuals of the measure. */
  residuals: ArrayLike<number>
  /** Their Jacobian rows. */
  gradients: readonly ArrayLike<number>[]
}

/** Below this determinant of I − H the measure alone fixes a parameter. */
const FIXES_A_PARAMETER = 1e-9

/**
 * Leverage and Cook's distance of one measure.
 * @param rows of the measure, whitened.
 * @param covariance of the parameters for unit variance.
 * @param scaleSquared s² = χ²/ν; null without degrees of freedom.
 * @returns leverage, 0 to the number of rows, and Cook's distance, ≥ 0.
 * Source: Cook 1977, Technometrics 19, 15; Cook & Weisberg 1982, 3.6.
 */
export function influenceOf(rows: InfluenceRows, covariance: number[][], scaleSquared: number | null): Influence {
  const { residuals, gradients } = rows
  const g1 = gradients[0]!
  const h11 = quadraticForm(covariance, g1)
  const p = covariance.length
  if (gradients.length === 1) {
    const rest = 1 - h11
    const isFixed = !(rest > FIXES_A_PARAMETER) || scaleSquared === null || !(scaleSquared > 0)
    return { leverage: h11, cook: isFixed ? null : (residuals[0]! * residuals[0]! * h11) / (rest * rest * p * scaleSquared) }
  }
  const g2 = gradients[1]!
  const h22 = quadraticForm(covariance, g2)
  const h12 = quadraticForm(covariance, g1, g2)
  const determinant = (1 - h11) * (1 - h22) - h12 * h12
  if (!(determinant > FIXES_A_PARAMETER) || scaleSquared === null || !(scaleSquared > 0)) return { leverage: h11 + h22, cook: null }
  const z1 = ((1 - h22) * residuals[0]! + h12 * residuals[1]!) / determinant
  const z2 = (h12 * residuals[0]! + (1 - h11) * residuals[1]!) / determinant
  const form = z1 * z1 * h11 + 2 * z1 * z2 * h12 + z2 * z2 * h22
  return { leverage: h11 + h22, cook: Math.max(0, form) / (p * scaleSquared) }
}
