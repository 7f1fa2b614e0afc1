import type { Element, FitResult } from '~~/fitting/types'

/** What a refit is compared with: the elements of the fit it started from and the measures that those rest on. */
export interface Before {
  number: number
  elements: Record<string, Element>
  usedIds: string[]
}

export function usedIdsOf({ residuals }: FitResult): string[] {
  return residuals.filter(({ status }) => status === 'used').map(({ id }) => id)
}

/**
 * How far elements moved by a refit, in units of the move's σ. Where one fit holds all measures of the other these cancel: σ_Δ² is
 * the variance with fewer measures less that with more; else the variances add. Null where σ is unknown or that difference is not above zero.
 */
export function changeOfRefit(before: Before, after: FitResult): Record<string, number | null> {
  const usedIds = usedIdsOf(after)
  const hasGrown = isWithin(before.usedIds, usedIds)
  const hasShrunk = !hasGrown && isWithin(usedIds, before.usedIds)
  const periodYr = after.elements.period?.value
  return Object.fromEntries(Object.entries(after.elements).map(([name, element]) => {
    const from = before.elements[name]
    if (!from || from.sigma === null || element.sigma === null) return [name, null]
    const variance = (hasShrunk ? -1 : 1) * from.sigma ** 2 + (hasGrown ? -1 : 1) * element.sigma ** 2
    const turn = element.unit === 'deg' ? 360 : name.startsWith('periastronTime') ? periodYr : undefined
    return [name, variance > 0 ? nearest(element.value - from.value, turn) / Math.sqrt(variance) : null]
  }))
}

function isWithin(ids: readonly string[], others: readonly string[]): boolean {
  const all = new Set(others)
  return ids.every(id => all.has(id))
}

function nearest(difference: number, turn: number | undefined): number {
  return turn === undefined ? difference : difference - turn * Math.round(difference / turn)
}
