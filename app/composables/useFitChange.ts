import type { Element } from '~~/fitting/types'
import type { FitView } from '#shared/schemas/fits'
import { useFitBench } from '~/stores/fitBench'

/** What a fit's elements are compared with: the fit a refit started from in this window, else the current edition. */
export function useFitChange(fit: () => FitView, editionNumber: () => number | null) {
  const bench = useFitBench()
  const before = computed(() => bench.beforeByFit[fit().id] ?? null)

  const changeInSigma = computed(() => {
    const result = fit().result
    return before.value && result ? changeOfNested(before.value.elements, result.elements) : fit().changeInSigma
  })
  const comparedWith = computed(() => {
    if (before.value) return `fit ${before.value.number}`
    return editionNumber() === null ? 'the current edition' : `edition ${editionNumber()}`
  })
  const largestChange = computed(() => {
    const changes = Object.values(changeInSigma.value ?? {}).filter(change => change !== null)
    return changes.length > 0 ? Math.max(...changes.map(Math.abs)) : null
  })

  return { changeInSigma, comparedWith, largestChange }
}

/**
 * How far elements moved between two fits of which one holds all measures of the other, in units of the move's σ: σ_Δ² = |σ_old² − σ_new²|,
 * as the shared measures cancel. Null where σ is unknown or nothing tells the two apart.
 */
function changeOfNested(before: Record<string, Element>, after: Record<string, Element>): Record<string, number | null> {
  const periodYr = after.period?.value
  return Object.fromEntries(Object.entries(after).map(([name, element]) => {
    const old = before[name]
    if (!old || old.sigma === null || element.sigma === null) return [name, null]
    const sigma = Math.sqrt(Math.abs(old.sigma ** 2 - element.sigma ** 2))
    const turn = element.unit === 'deg' ? 360 : name.startsWith('periastronTime') ? periodYr : undefined
    return [name, sigma > 0 ? nearest(element.value - old.value, turn) / sigma : null]
  }))
}

function nearest(difference: number, turn: number | undefined): number {
  return turn === undefined ? difference : difference - turn * Math.round(difference / turn)
}
