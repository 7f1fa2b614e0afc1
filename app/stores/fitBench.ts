import { defineStore } from 'pinia'
import { ref } from 'vue'
import type { FitView } from '#shared/schemas/fits'
import { usedIdsOf } from '~/components/fit/change-of-refit'
import type { Before } from '~/components/fit/change-of-refit'

/** A coordinator's change to a fit that has not been refitted yet. */
export type PendingChange = { kind: 'set-aside'; reason: string } | { kind: 'take-back' }

/** What a coordinator is trying on fits: changes chosen but not refitted, reasons typed but not sent, and what a refit started from. */
export const useFitBench = defineStore('fitBench', () => {
  const changes = ref<Record<string, Record<string, PendingChange>>>({})
  const reasons = ref<Record<string, string>>({})
  const beforeByFit = ref<Record<string, Before>>({})

  const changesOf = (fitId: string) => changes.value[fitId] ?? {}

  function change(fitId: string, measureId: string, pending: PendingChange) {
    changes.value[fitId] = { ...changesOf(fitId), [measureId]: pending }
  }

  function undo(fitId: string, measureId: string) {
    changes.value[fitId] = Object.fromEntries(Object.entries(changesOf(fitId)).filter(([id]) => id !== measureId))
  }

  function dropAll(fitId: string) {
    changes.value[fitId] = {}
  }

  /** The whole list of what the next fit leaves out: what this one left out, less what is taken back, and what is newly set aside. */
  function setAsideList(fit: FitView): { measureId: string; reason: string }[] {
    const pending = changesOf(fit.id)
    const kept = fit.measures
      .filter(measure => measure.role === 'set-aside' && pending[measure.id] === undefined)
      .map(measure => ({ measureId: measure.id, reason: measure.reason ?? 'as in the fit before' }))
    const added = Object.entries(pending).flatMap(([measureId, { kind, ...rest }]) =>
      kind === 'set-aside' && 'reason' in rest ? [{ measureId, reason: rest.reason }] : [])
    return [...kept, ...added]
  }

  function rememberBefore(newFitId: string, fit: FitView) {
    if (fit.result) beforeByFit.value[newFitId] = { number: fit.number, elements: fit.result.elements, usedIds: usedIdsOf(fit.result) }
  }

  return { changes, reasons, beforeByFit, changesOf, change, undo, dropAll, setAsideList, rememberBefore }
})
