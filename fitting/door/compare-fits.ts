/**
 * Do fits of several batches agree with the fit of all their measures together?
 *   Q = χ²(pooled) − Σ χ²(each),  ν_Q = Σ rank(J_i) − rank(J_pooled),  F = (Q/ν_Q) / (Σχ²_i / Σν_i)
 * Q is χ² with ν_Q degrees of freedom only where the errors are calibrated; with errors stated too small it raises false alarms, and F
 * does not. Differences of elements over the sum of their covariances are no test: they raise false alarms in most cases.
 * Source: Chow 1960, Econometrica 28, 591 (equality of coefficients).
 */
import type { Agreement, FitResult } from '../types'
import { chiSquareShares, fShares } from '../uncertainty/distributions'

const DISAGREES_BELOW = 0.01

/** σ² in which χ² is counted: 1 for stated errors, the estimated variance where errors were estimated. */
function unitVariance({ statistics }: FitResult): number {
  const estimated = statistics.estimatedSigma
  if (estimated === undefined) return 1
  const sigma = (estimated.position ?? estimated.r ?? estimated.diameterArcmin)?.value ?? 1
  return sigma * sigma
}

function statementOf(probability: number | null): string {
  if (probability === null) return 'Whether the parts agree cannot be told: they leave no degrees of freedom, or their errors are of different kinds.'
  const rounded = probability < 0.001 ? 'below 0.001' : probability.toFixed(3)
  return probability < DISAGREES_BELOW
    ? `The parts do not agree with one orbit (p ${rounded}): look for offsets, changed quadrants or wrong errors before merging.`
    : `The parts agree with one orbit (p ${rounded}).`
}

/**
 * Tests whether parts agree with their pooled fit.
 * @param parts fits of disjoint batches, at least two, of one kind and model.
 * @param pooled the fit of all their measures together.
 * @returns Q, F and their probabilities, and a statement.
 * @throws RangeError with fewer than two parts or with parts of another kind or model (a programmer's error).
 * Source: Chow 1960, Econometrica 28, 591.
 */
export function compareFits(parts: readonly FitResult[], pooled: FitResult): Agreement {
  if (parts.length < 2) throw new RangeError('compareFits: at least two parts are needed.')
  if (parts.some((part) => part.kind !== pooled.kind || part.model !== pooled.model)) throw new RangeError('compareFits: all fits must be of one kind and model.')
  const all = [...parts, pooled]
  const isEstimated = pooled.statistics.errorBasis === 'scaled'
  const isAlike = all.every((fit) => (fit.statistics.errorBasis === 'scaled') === isEstimated)
  const chiSquare = (fit: FitResult) => fit.statistics.chiSquare * unitVariance(fit)
  const rank = (fit: FitResult) => fit.statistics.rank ?? fit.statistics.parameters
  const inParts = parts.reduce((sum, part) => sum + chiSquare(part), 0)
  const partDegreesOfFreedom = parts.reduce((sum, part) => sum + part.statistics.rows - rank(part), 0)
  const degreesOfFreedom = parts.reduce((sum, part) => sum + rank(part), 0) - rank(pooled)
  const q = chiSquare(pooled) - inParts
  const hasF = isAlike && degreesOfFreedom > 0 && partDegreesOfFreedom > 0 && inParts > 0
  const f = hasF ? Math.max(0, q) / degreesOfFreedom / (inParts / partDegreesOfFreedom) : null
  const probabilityF = f === null ? null : fShares(f, degreesOfFreedom, partDegreesOfFreedom).upper
  const probabilityChiSquare = isEstimated || !isAlike || degreesOfFreedom <= 0 ? null : chiSquareShares(Math.max(0, q), degreesOfFreedom).upper
  return { q, degreesOfFreedom, partDegreesOfFreedom, probabilityChiSquare, f, probabilityF, statement: statementOf(probabilityF) }
}
