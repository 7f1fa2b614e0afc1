/**
 * Errors by observer and method, from the residuals: one σ a group, that of a single night, the same along and across. Fit and errors
 * follow each other until the errors settle.
 *   σ_g² ← σ_g² Σ r² / (rows_g − leverage_g)      r whitened with σ_g
 * A group with fewer than three rows to spare takes the typical σ, the median of the others; none goes below 0.3 of it: without a floor the
 * group that the orbit happens to pass through draws ever more weight.
 * Source: estimates of variance by group in turn with the fit, common practice; floor and median are ours.
 */
import { rowsOf, withGroupErrors, type SkyMeasure, type SkyMeasures } from '../models/sky-measure'
import type { SettledPath } from '../search/settle-path'
import type { RobustlySettled } from '../search/settle-robustly'
import { covarianceOf } from '../solve/covariance'
import { median } from '../solve/median'
import type { ObserverError } from '../types'
import { quadraticForm } from '../uncertainty/error-scale'

const LEAST_ROWS_TO_SPARE = 3
const FLOOR_PART = 0.3
const LARGEST_ROUNDS = 30
const SETTLED = 1e-6
/** σ below this part of the provisional one is rounding. */
const NOISE_FREE = 1e-9

interface Group {
  observer: string
  method: string | null
  measures: number
  /** Σ r² in arcsec² of a single night, and what it is divided by. */
  squares: number
  rowsToSpare: number
}

const keyOf = (measure: SkyMeasure) => JSON.stringify([measure.observer, measure.method])

/** σ of a single night of a measure with one σ along and across. */
const ownSigma = (measure: SkyMeasure) => measure.sigmaAlong / measure.nightsFactor

function groupsOf(used: readonly SkyMeasure[], { solution }: SettledPath): Map<string, Group> {
  const { residuals, jacobian, values } = solution
  const p = values.length
  const { matrix } = covarianceOf({ rows: residuals.length, columns: p, jacobian, residuals })
  const groups = new Map<string, Group>()
  let at = 0
  for (const measure of used) {
    const key = keyOf(measure)
    const group = groups.get(key) ?? { observer: measure.observer, method: measure.method, measures: 0, squares: 0, rowsToSpare: 0 }
    const sigma = ownSigma(measure)
    group.measures++
    for (let k = 0; k < rowsOf(measure); k++, at++) {
      const leverage = matrix === null ? p / residuals.length : quadraticForm(matrix, jacobian.subarray(at * p, (at + 1) * p))
      group.squares += residuals[at]! * residuals[at]! * sigma * sigma
      group.rowsToSpare += measure.robustWeight - leverage
    }
    groups.set(key, group)
  }
  return groups
}

/** Errors of all groups, by key in code-unit order. */
function errorsOf(groups: ReadonlyMap<string, Group>): Map<string, ObserverError> {
  const keys = [...groups.keys()].sort((a, b) => (a < b ? -1 : 1))
  const own = (group: Group) => Math.sqrt(group.squares / group.rowsToSpare)
  const known = keys.map((key) => groups.get(key)!).filter((group) => group.rowsToSpare >= LEAST_ROWS_TO_SPARE)
  const all = [...groups.values()]
  const pooled = Math.sqrt(all.reduce((sum, group) => sum + group.squares, 0) / all.reduce((sum, group) => sum + group.rowsToSpare, 0))
  const typical = known.length > 0 ? median(known.map(own)) : pooled
  return new Map(keys.map((key) => {
    const group = groups.get(key)!
    const { observer, method, measures } = group
    const basis = group.rowsToSpare < LEAST_ROWS_TO_SPARE ? 'typical' : own(group) < FLOOR_PART * typical ? 'floor' : 'estimated'
    const sigmaArcsec = basis === 'typical' ? typical : basis === 'floor' ? FLOOR_PART * typical : own(group)
    return [key, { observer, method, measures, sigmaArcsec, weight: (typical * typical) / (sigmaArcsec * sigmaArcsec), basis }]
  }))
}

/**
 * Estimates errors by observer and method.
 * @param first a fit of all measures with one σ for all.
 * @param refit fits the measures again, beginning at the solutions before.
 * @returns the last fit with its measures, and the errors it was made with; the first fit and no errors where nothing is left over to
 * estimate from or the residuals are rounding.
 * Source: common practice.
 */
export function settleByObserver(first: RobustlySettled, refit: (measures: SkyMeasures, before: readonly SettledPath[]) => RobustlySettled): RobustlySettled & { observerErrors: ObserverError[] } {
  let settled = first
  let errors = new Map<string, ObserverError>()
  for (let round = 0; round < LARGEST_ROUNDS; round++) {
    const { used } = settled.measures
    const next = errorsOf(groupsOf(used, settled.solutions[0]!))
    const isKnown = [...next.values()].every(({ sigmaArcsec }) => sigmaArcsec > NOISE_FREE * ownSigma(used[0]!) && sigmaArcsec < Infinity)
    if (!isKnown) break
    const change = [...next].reduce((largest, [key, { sigmaArcsec }]) => Math.max(largest, Math.abs(sigmaArcsec / (errors.get(key)?.sigmaArcsec ?? Infinity) - 1)), 0)
    if (change <= SETTLED) break
    errors = next
    settled = refit(withGroupErrors(settled.measures, (measure) => errors.get(keyOf(measure))?.sigmaArcsec ?? NaN), settled.solutions)
  }
  return { ...settled, observerErrors: [...errors.values()] }
}
