import type { FitResult } from '../../fitting/types'

/** Whole turn of an angular element; the ascending node is unknown without velocities, so node and ω then repeat by half turns. */
function turnDeg(name: string, older: FitResult, newer: FitResult): number {
  const isEitherNode = older.nodeStatus === 'ambiguous' || newer.nodeStatus === 'ambiguous'
  return isEitherNode && (name === 'node' || name === 'argumentOfPeriastron') ? 180 : 360
}

function nearest(difference: number, cycle: number): number {
  return difference - cycle * Math.round(difference / cycle)
}

function difference(name: string, older: FitResult, newer: FitResult): number {
  const from = older.elements[name]!
  const to = newer.elements[name]!
  if (to.unit === 'deg' && name !== 'inclination') return nearest(to.value - from.value, turnDeg(name, older, newer))
  // A passage and the next one are the same statement about the orbit.
  if (name === 'periastronTime' && newer.elements.period) return nearest(to.value - from.value, newer.elements.period.value)
  return to.value - from.value
}

export function usedMeasureIds(result: FitResult): Set<string> {
  return new Set(result.residuals.filter(r => r.status === 'used').map(r => r.id))
}

function contains(newer: FitResult, older: FitResult): boolean {
  const used = usedMeasureIds(newer)
  return [...usedMeasureIds(older)].every(id => used.has(id))
}

/**
 * (new − old) / σ of the difference, by element. Where the new fit contains the measures of the old, the two are not
 * independent and σ_Δ² = σ_old² − σ_new² (Hausman 1978, Econometrica 46, 1251); else the variances add. An element is null
 * where either error is unknown, where the difference of variances is not positive, or where only one fit has it.
 */
export function changeInSigma(older: FitResult, newer: FitResult): Record<string, number | null> {
  const isNested = contains(newer, older)
  const change: Record<string, number | null> = {}
  for (const [name, to] of Object.entries(newer.elements)) {
    const from = older.elements[name]
    if (!from || from.unit !== to.unit || from.sigma === null || to.sigma === null) {
      change[name] = null
      continue
    }
    if (name === 'meanAnomaly' && older.epochOfElements !== newer.epochOfElements) {
      change[name] = null // of two dates: not to be compared
      continue
    }
    const moved = difference(name, older, newer)
    const variance = isNested ? from.sigma ** 2 - to.sigma ** 2 : from.sigma ** 2 + to.sigma ** 2
    if (moved === 0) change[name] = 0
    else change[name] = variance > 0 ? moved / Math.sqrt(variance) : null
  }
  return change
}
