/**
 * What one more measure would add, by date: for the whitened Jacobian G of a measure and the covariance C of the parameters,
 *   S = I + G C Gᵀ,  information ½ ln det S,  C after = C − C Gᵀ S⁻¹ G C
 * Source: Fedorov 1972, Theory of Optimal Experiments (D-optimal designs).
 */
import { cos, DEG, hypot, log, sin } from '../elementary'
import { orbitOfState } from '../models/equatorial-orbit'
import { PLANE_NAMES } from '../models/plane'
import { keplerPath } from '../models/relative-kepler'
import { ARCSEC_RAD } from '../models/sighting'
import type { FitResult, FitState, Gain, MeasureSigma } from '../types'
import { equatorialElements } from '../uncertainty/equatorial-elements'
import { quadraticForm, type Quantity } from '../uncertainty/error-scale'
import { ELEMENT_NAMES, relativeElements } from '../uncertainty/relative-elements'
import { planeQuantities } from './judge-plane'
import { skyGradientsAt } from './predict-equatorial'

/** Whitened gradient rows of a planned measure; empty where the conic does not reach that direction. */
type RowsAt = (at: number) => Float64Array[]

function skyRowsAt(state: FitState, sigma: Extract<MeasureSigma, { kind: 'relative' }>): RowsAt {
  const path = keplerPath(state.referenceEpochYr)
  const p = path.parameters
  const position = new Float64Array(2 + 2 * p)
  path.prepare(state.values)
  return (epochYr) => {
    path.at(epochYr, position, true)
    const [x, y] = [position[0]!, position[1]!]
    const rho = hypot(x, y)
    if (!(rho > 0)) return []
    const across = rho * sigma.sigmaThetaRad
    const row = (byX: number, byY: number) => Float64Array.from({ length: p }, (_, j) => byX * position[2 + j]! + byY * position[2 + p + j]!)
    return [row(x / rho / sigma.sigmaRhoArcsec, y / rho / sigma.sigmaRhoArcsec), row(-y / rho / across, x / rho / across)]
  }
}

function planeRowsAt(state: FitState, sigma: Extract<MeasureSigma, { kind: 'plane' }>): RowsAt {
  const [p, k, h] = state.values as [number, number, number]
  return (phiDeg) => {
    const [c, s] = [cos(phiDeg * DEG), sin(phiDeg * DEG)]
    const denominator = 1 + k * c + h * s
    if (!(denominator > 0)) return []
    const r = p / denominator
    const row = new Float64Array(state.values.length)
    row.set([r / p / sigma.sigmaR, (-r * c) / denominator / sigma.sigmaR, (-r * s) / denominator / sigma.sigmaR])
    return [row]
  }
}

/** C after a measure, row by row: each row is a rank-one update of its own s ≥ 1, and det S is their product. */
function updated(covariance: number[][], rows: readonly Float64Array[]): { covariance: number[][]; information: number } {
  let current = covariance
  let information = 0
  for (const row of rows) {
    const carried = current.map((line) => line.reduce((sum, value, j) => sum + value * row[j]!, 0))
    const s = 1 + Math.max(0, carried.reduce((sum, value, j) => sum + value * row[j]!, 0))
    information += log(s) / 2
    current = current.map((line, i) => line.map((value, j) => value - (carried[i]! * carried[j]!) / s))
  }
  return { covariance: current, information }
}

function sightRowsAt(state: FitState, sigma: Extract<MeasureSigma, { kind: 'equatorial' }>): RowsAt {
  const gradientsAt = skyGradientsAt(state)
  return (jdTt) => {
    const gradients = gradientsAt(jdTt)
    return gradients === null ? [] : [
      gradients.east.map((part) => part / (sigma.sigmaRaCosDecArcsec * ARCSEC_RAD)), gradients.north.map((part) => part / (sigma.sigmaDecArcsec * ARCSEC_RAD)),
    ]
  }
}

function rowsAtOf(state: FitState, sigma: MeasureSigma): RowsAt {
  if (sigma.kind === 'plane') return planeRowsAt(state, sigma)
  return sigma.kind === 'relative' ? skyRowsAt(state, sigma) : sightRowsAt(state, sigma)
}

function errorsOf(sigma: MeasureSigma): number[] {
  if (sigma.kind === 'plane') return [sigma.sigmaR]
  return sigma.kind === 'relative' ? [sigma.sigmaThetaRad, sigma.sigmaRhoArcsec] : [sigma.sigmaRaCosDecArcsec, sigma.sigmaDecArcsec]
}

function quantitiesOf(result: FitResult): Record<string, Quantity> {
  const { state } = result
  if (result.kind === 'equatorial') return equatorialElements(orbitOfState(state), state.values, state.reference!.jdTt).quantities
  if (result.kind === 'plane') {
    const hasTimes = state.values.length > PLANE_NAMES.length
    return planeQuantities(state.values, result.elements.semiLatusRectum?.unit ?? '', hasTimes ? state.referenceEpochYr : null)
  }
  const lastEpochYr = result.statistics.arc.lastEpochYr ?? state.referenceEpochYr
  const { quantities } = relativeElements({ values: state.values, covariance: state.covariance, referenceEpochYr: state.referenceEpochYr, lastEpochYr })
  return Object.fromEntries(ELEMENT_NAMES.map((name) => [name, quantities[name]]))
}

/**
 * Gain of one more measure at each of several dates or directions.
 * @param result an orbit of fitOrbit (model kepler) with errors.
 * @param at epochs, Julian years (relative) or JD of TT (equatorial), or directions φ, degrees (plane); finite.
 * @param sigma errors that the planned measure would have, > 0.
 * @returns one gain each; information 0 where the conic does not reach, sigmasAfter null where an element is not determined.
 * @throws RangeError without errors in the result, for another kind or model, or for numbers that are none (a programmer's error).
 * Source: Fedorov 1972, Theory of Optimal Experiments.
 */
export function gainByEpoch(result: FitResult, at: readonly number[], sigma: MeasureSigma): Gain[] {
  const { covariance } = result.state
  if (covariance === null) throw new RangeError('gainByEpoch: the result has no errors to improve.')
  if (result.kind !== sigma.kind || result.model !== 'kepler') throw new RangeError('gainByEpoch: the errors do not belong to this kind of orbit.')
  const errors = errorsOf(sigma)
  if (![...at, ...errors].every((value) => value - value === 0) || errors.some((value) => !(value > 0))) throw new RangeError('gainByEpoch: dates and errors must be finite numbers, errors above 0.')
  const rowsAt = rowsAtOf(result.state, sigma)
  const quantities = quantitiesOf(result)
  return at.map((when) => {
    const after = updated(covariance, rowsAt(when))
    const sigmasAfter = Object.fromEntries(Object.entries(quantities).map(([name, { gradient }]) => {
      const variance = quadraticForm(after.covariance, gradient)
      return [name, variance >= 0 && variance < Infinity ? Math.sqrt(variance) : null]
    }))
    return { at: when, information: after.information, sigmasAfter }
  })
}
