/**
 * A conic in its own plane, without times: r(φ) = p / (1 + k cos φ + h sin φ), k = e cos φ₀, h = e sin φ₀, any e ≥ 0.
 * Start: weighted linear fit of 1/r = α + β cos φ + γ sin φ (weights r⁴/σ²), p = 1/α, k = β/α, h = γ/α.
 * A measured diameter d = c/r is linear in (1/p, k/p, h/p) and enters as itself, so its error stays symmetric.
 * Defined where p > 0 and 1 + k cos φ + h sin φ > 0 at every measured direction (one side of the asymptotes).
 */
import { cos, sin } from '../elementary'
import type { LeastSquaresProblem } from '../solve/least-squares-problem'
import type { PlanePoint } from './plane-measure'

/** Names of the regular parameters, in order. */
export const PLANE_NAMES = ['semiLatusRectum', 'k', 'h'] as const

/** 1 + e cos ν below this is the asymptote: r beyond 1e12 p. */
const SMALLEST_DENOMINATOR = 1e-12

interface PreparedPoint {
  cosine: number
  sine: number
  isDiameter: boolean
  value: number
  /** √weight / σ. */
  whitening: number
  scale: number
}

function prepare(points: readonly PlanePoint[], diameterScale: number | null): PreparedPoint[] {
  return points.map((point) => ({
    cosine: cos(point.phiRad), sine: sin(point.phiRad), isDiameter: point.coordinate === 'diameterArcmin',
    value: point.value, whitening: Math.sqrt(point.weight) / point.sigma, scale: diameterScale ?? 1,
  }))
}

/**
 * Whitened problem of a conic in (p, k, h).
 * @param points used measures with errors.
 * @param diameterScale c, where diameters were measured.
 * @returns a problem with analytic Jacobian.
 */
export function planeProblem(points: readonly PlanePoint[], diameterScale: number | null): LeastSquaresProblem {
  const prepared = prepare(points, diameterScale)
  return {
    parameters: 3,
    rows: points.length,
    evaluate(values, residuals, jacobian) {
      const p = values[0]!
      if (!(p > 0)) return false
      for (let i = 0; i < prepared.length; i++) {
        const { cosine, sine, isDiameter, value, whitening, scale } = prepared[i]!
        const denominator = 1 + values[1]! * cosine + values[2]! * sine
        if (!(denominator > SMALLEST_DENOMINATOR)) return false
        const model = isDiameter ? (scale * denominator) / p : p / denominator
        residuals[i] = (model - value) * whitening
        if (!jacobian) continue
        const byShape = isDiameter ? scale / p : -p / (denominator * denominator)
        jacobian[3 * i] = (isDiameter ? -model / p : 1 / denominator) * whitening
        jacobian[3 * i + 1] = byShape * cosine * whitening
        jacobian[3 * i + 2] = byShape * sine * whitening
      }
      return true
    },
  }
}

/** The linear problem of 1/r in (α, β, γ), for the start. */
export function reciprocalProblem(points: readonly PlanePoint[]): LeastSquaresProblem {
  const prepared = points.map((point) => {
    const sigmaR = point.coordinate === 'r' ? point.sigma : (point.r * point.sigma) / point.value
    return { cosine: cos(point.phiRad), sine: sin(point.phiRad), reciprocal: 1 / point.r, whitening: (Math.sqrt(point.weight) * point.r * point.r) / sigmaR }
  })
  return {
    parameters: 3,
    rows: points.length,
    evaluate(values, residuals, jacobian) {
      prepared.forEach(({ cosine, sine, reciprocal, whitening }, i) => {
        residuals[i] = (values[0]! + values[1]! * cosine + values[2]! * sine - reciprocal) * whitening
        if (jacobian) {
          jacobian[3 * i] = whitening
          jacobian[3 * i + 1] = cosine * whitening
          jacobian[3 * i + 2] = sine * whitening
        }
      })
      return true
    },
  }
}

/**
 * The same conic with e = 1 held: φ₀ takes the place of k and h, what follows stays. For the test of the parabola.
 * @param full a problem whose first parameters are p, k and h.
 * @returns a problem of one parameter less.
 */
export function parabolaProblem(full: LeastSquaresProblem): LeastSquaresProblem {
  const inner = new Float64Array(full.parameters)
  const wide = new Float64Array(full.parameters * full.rows)
  const count = full.parameters - 1
  return {
    parameters: count,
    rows: full.rows,
    evaluate(values, residuals, jacobian) {
      const c = cos(values[1]!)
      const s = sin(values[1]!)
      inner[0] = values[0]!
      inner[1] = c
      inner[2] = s
      for (let j = 3; j <= count; j++) inner[j] = values[j - 1]!
      if (!full.evaluate(inner, residuals, jacobian ? wide : null)) return false
      if (!jacobian) return true
      for (let i = 0; i < full.rows; i++) {
        const row = i * full.parameters
        jacobian[count * i] = wide[row]!
        jacobian[count * i + 1] = -s * wide[row + 1]! + c * wide[row + 2]!
        for (let j = 3; j <= count; j++) jacobian[count * i + j - 1] = wide[row + j]!
      }
      return true
    },
  }
}
