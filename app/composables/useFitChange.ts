import type { FitView } from '#shared/schemas/fits'
import { changeOfRefit } from '~/components/fit/change-of-refit'
import { useFitBench } from '~/stores/fitBench'

/** What a fit's elements are compared with: the fit a refit started from in this window, else the current edition. */
export function useFitChange(fit: () => FitView, editionNumber: () => number | null) {
  const bench = useFitBench()
  const before = computed(() => bench.beforeByFit[fit().id] ?? null)

  const changeInSigma = computed(() => {
    const result = fit().result
    return before.value && result ? changeOfRefit(before.value, result) : fit().changeInSigma
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
