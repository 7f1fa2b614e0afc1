/**
 * What a robust fit proposes about single measures; nothing is done until a coordinator says so.
 *   set aside where d > 6 s; change the quadrant instead where θ + 180° gives d' < 0.3 d and d' < 5 s.
 */
import { PI } from '../elementary'
import { rowsOf, type SkyMeasure } from '../models/sky-measure'
import type { SkyPath } from '../models/sky-path'
import { distancesOf } from '../search/settle-robustly'
import { BIWEIGHT_REACH, robustScale } from '../solve/biweight'
import type { Proposal, Residual } from '../types'

const CHANGED_PART = 0.3
const CHANGED_WITHIN = 5

/** The measure with its position angle turned by half a turn. */
function withOtherQuadrant(measure: SkyMeasure): SkyMeasure {
  return { ...measure, thetaRad: measure.thetaRad + PI }
}

/**
 * Proposals of a robust fit.
 * @param used used measures, in the order of the fit.
 * @param residuals of all measures.
 * @param orbit path and parameters of the solution.
 * @returns at most one proposal a measure, in the order of the measures.
 */
export function proposalsOf(used: readonly SkyMeasure[], residuals: readonly Residual[], orbit: { path: SkyPath; values: ArrayLike<number> }): Proposal[] {
  const lengths = new Map(residuals.map((residual) => [residual.id, residual.normalised ?? 0]))
  const distances = used.map((measure) => lengths.get(measure.id) ?? 0)
  const scale = robustScale(distances, (i) => rowsOf(used[i]!) === 2)
  const changed = distancesOf(orbit.path, orbit.values, used.map(withOtherQuadrant))
  return used.flatMap((measure, i): Proposal[] => {
    const s = rowsOf(measure) === 2 ? scale.pair : scale.single
    const d = distances[i]!
    if (!(d > BIWEIGHT_REACH * s) || !(s > 0)) return []
    const hasQuadrant = (measure.form === 'polar' || measure.form === 'theta') && !measure.isAmbiguous
    const off = `lies ${(d / s).toFixed(1)} times the typical scatter off the orbit`
    if (hasQuadrant && changed[i]! < CHANGED_PART * d && changed[i]! < CHANGED_WITHIN * s) {
      return [{ measureId: measure.id, action: 'change-quadrant', reason: `It ${off}; turned by 180° it lies ${(changed[i]! / s).toFixed(1)} times off.` }]
    }
    return [{ measureId: measure.id, action: 'set-aside', reason: `It ${off}, and carries no weight in the robust fit.` }]
  })
}
