/**
 * Is there an orbit at all? Straight motion against straight motion with a curvature towards the primary, κ, one-sided:
 * z = κ/σ_κ; without a significant κ the motion so far is straight.
 * A χ² test with the three further parameters of an orbit has far too few false alarms, because the orbit's parameters are not free
 * near a straight line.
 */
import { curvedLinePath } from '../models/curved-line'
import { linePath } from '../models/relative-line'
import type { SkyMeasure, SkyMeasures } from '../models/sky-measure'
import { settleStarts, type SettledPath } from '../search/settle-path'
import { covarianceOf } from '../solve/covariance'
import { median } from '../solve/median'
import { cos, sin } from '../elementary'
import { normalShares, studentShares } from './distributions'

/** The curvature of the motion so far. */
export interface Straightness {
  /** κ, arcsec³ a year², > 0 towards the primary, and its published error. */
  kappa: number
  sigma: number
  /** Probability of so large a κ on straight motion. */
  probability: number
}

function north(m: SkyMeasure): number {
  return m.form === 'rectangular' ? m.north : m.rhoArcsec * cos(m.thetaRad)
}

function east(m: SkyMeasure): number {
  return m.form === 'rectangular' ? m.east : m.rhoArcsec * sin(m.thetaRad)
}

/**
 * A start for straight motion: through the medians of the first and the last third of the measures with both coordinates.
 * @param used used measures, sorted by epoch.
 * @param referenceEpochYr t₀, Julian year.
 * @returns x₀, y₀, ẋ, ẏ; null where no measure has both coordinates.
 */
export function lineStart(used: readonly SkyMeasure[], referenceEpochYr: number): number[] | null {
  const full = used.filter((m) => m.form === 'polar' || m.form === 'rectangular')
  if (full.length === 0) return null
  const third = Math.max(1, Math.floor(full.length / 3))
  const early = full.slice(0, third)
  const late = full.slice(full.length - third)
  const middle = (group: readonly SkyMeasure[], of: (m: SkyMeasure) => number) => median(group.map(of))
  const t1 = middle(early, (m) => m.epochYr)
  const t2 = middle(late, (m) => m.epochYr)
  const slope = (of: (m: SkyMeasure) => number) => (t2 > t1 ? (middle(late, of) - middle(early, of)) / (t2 - t1) : 0)
  const at = (of: (m: SkyMeasure) => number) => middle(early, of) + slope(of) * (referenceEpochYr - t1)
  return [at(north), at(east), slope(north), slope(east)]
}

/**
 * Fits straight motion.
 * @param measures prepared measures.
 * @param referenceEpochYr t₀, Julian year.
 * @returns the line; null where no measure has both coordinates, or the line begins where a direction is not defined.
 */
export function fitLine(measures: SkyMeasures, referenceEpochYr: number): SettledPath | null {
  const start = lineStart(measures.used, referenceEpochYr)
  if (start === null) return null
  return settleStarts(linePath(referenceEpochYr), measures.used, [start], () => undefined)[0] ?? null
}

/**
 * Tests straight motion for curvature towards the primary.
 * @param measures prepared measures, sorted.
 * @param referenceEpochYr t₀, Julian year.
 * @returns κ with its error and the probability of so large a κ on straight motion; null where the line stands still or κ is not determined.
 */
export function straightnessOf(measures: SkyMeasures, referenceEpochYr: number): Straightness | null {
  const line = fitLine(measures, referenceEpochYr)
  if (line === null) return null
  const [x0, y0, xDot, yDot] = line.solution.values as unknown as [number, number, number, number]
  if (!(xDot * xDot + yDot * yDot > 0)) return null
  const { used, basis } = measures
  const spanYr = used[used.length - 1]!.epochYr - used[0]!.epochYr
  const path = curvedLinePath({ x0, y0, xDot, yDot, referenceEpochYr, spanYr })
  const settled = settleStarts(path, used, [[x0, y0, xDot, yDot, 0]], () => undefined)[0]
  if (settled === undefined) return null
  const { solution } = settled
  const rows = solution.residuals.length
  const { matrix } = covarianceOf({ rows, columns: 5, jacobian: solution.jacobian, residuals: solution.residuals })
  const degrees = rows - 5
  if (matrix === null || degrees <= 0) return null
  const scatter = basis === 'formal' ? 1 : Math.sqrt(solution.chiSquare / degrees)
  const sigma = Math.sqrt(matrix[4]![4]!) * scatter
  const kappa = solution.values[4]!
  const shares = basis === 'formal' ? normalShares(kappa / sigma) : studentShares(kappa / sigma, degrees)
  return sigma > 0 ? { kappa, sigma, probability: shares.upper } : null
}

