/** Predictions with error bands from the state of a result. */
import { atan2, cos, DEG, hypot, RAD, sin } from '../elementary'
import { withinTurn } from '../conic/thiele-innes'
import { keplerPath } from '../models/relative-kepler'
import { linePath, stillPath } from '../models/relative-line'
import type { SkyPath } from '../models/sky-path'
import type { FitResult, FitState, Prediction } from '../types'
import { quadraticForm } from '../uncertainty/error-scale'
import { predictEquatorial } from './predict-equatorial'

function pathOf(state: FitState): SkyPath {
  if (state.model === 'line') return linePath(state.referenceEpochYr)
  return state.model === 'still' ? stillPath() : keplerPath(state.referenceEpochYr)
}

function sigmaOf(covariance: number[][] | null, gradient: ArrayLike<number>): number | null {
  if (covariance === null) return null
  const variance = quadraticForm(covariance, gradient)
  return variance >= 0 && variance < Infinity ? Math.sqrt(variance) : null
}

function combined(first: Float64Array, second: Float64Array, a: number, b: number): Float64Array {
  return first.map((value, j) => a * value + b * second[j]!)
}

function skyPrediction(state: FitState, path: SkyPath, epochYr: number): Prediction {
  const p = path.parameters
  const position = new Float64Array(2 + 2 * p)
  path.at(epochYr, position, true)
  const north = position[0]!
  const east = position[1]!
  const rho = hypot(north, east)
  const byNorth = position.subarray(2, 2 + p)
  const byEast = position.subarray(2 + p)
  const gradients = {
    thetaDeg: combined(byNorth, byEast, (-east / (rho * rho)) * RAD, (north / (rho * rho)) * RAD),
    rhoArcsec: combined(byNorth, byEast, north / rho, east / rho),
    eastArcsec: byEast,
    northArcsec: byNorth,
  }
  const { covariance } = state
  const sigmaTheta = sigmaOf(covariance, gradients.thetaDeg)
  const sigmaRho = sigmaOf(covariance, gradients.rhoArcsec)
  const isKnown = covariance !== null && sigmaTheta !== null && sigmaRho !== null && sigmaTheta > 0 && sigmaRho > 0
  return {
    at: epochYr,
    values: { thetaDeg: withinTurn(atan2(east, north)) * RAD, rhoArcsec: rho, eastArcsec: east, northArcsec: north },
    sigmas: {
      thetaDeg: sigmaTheta, rhoArcsec: sigmaRho, eastArcsec: sigmaOf(covariance, gradients.eastArcsec), northArcsec: sigmaOf(covariance, gradients.northArcsec),
    },
    correlation: isKnown ? quadraticForm(covariance, gradients.thetaDeg, gradients.rhoArcsec) / (sigmaTheta * sigmaRho) : null,
  }
}

function planePrediction(state: FitState, phiDeg: number): Prediction {
  const [p, k, h] = state.values as [number, number, number]
  const c = cos(phiDeg * DEG)
  const s = sin(phiDeg * DEG)
  const denominator = 1 + k * c + h * s
  if (!(denominator > 0)) return { at: phiDeg, values: {}, sigmas: {}, correlation: null }
  const r = p / denominator
  const gradient = new Float64Array(state.values.length)
  gradient.set([r / p, (-r * c) / denominator, (-r * s) / denominator])
  return { at: phiDeg, values: { r }, sigmas: { r: sigmaOf(state.covariance, gradient) }, correlation: null }
}

/**
 * Predicts places from a result.
 * @param result of fitOrbit; only its kind and state are used.
 * @param at epochs, Julian years (relative) or JD of TT (equatorial), or directions φ, degrees (plane); finite.
 * @returns one prediction each: θ, ρ, east, north with σ and the correlation of θ and ρ; or r with σ (empty where the conic does not
 * reach that direction).
 * @throws RangeError where an epoch or direction is not a finite number (a programmer's error).
 * Source: propagation of errors, Bevington & Robinson (2003), 3.2.
 */
export function predict(result: Pick<FitResult, 'kind' | 'state'>, at: readonly number[]): Prediction[] {
  for (const value of at) if (!(value - value === 0)) throw new RangeError('predict: every epoch or direction must be a finite number.')
  if (result.kind === 'equatorial') return predictEquatorial(result.state, at)
  if (result.kind === 'plane') return at.map((phiDeg) => planePrediction(result.state, phiDeg))
  const path = pathOf(result.state)
  path.prepare(result.state.values)
  return at.map((epochYr) => skyPrediction(result.state, path, epochYr))
}
