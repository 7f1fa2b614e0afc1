import type { StreamEvent } from '#shared/schemas/events'
import type { FitView } from '#shared/schemas/fits'
import { useEvents } from './useEvents'

interface Watched {
  targetId: () => string
  fit: () => FitView | null
  /** Reads the page anew. */
  refresh: () => void
}

/** How far the fit on the sheet has come, from the event stream and, before the first event, from its job's row; null when it is made. */
export function useSheetProgress({ targetId, fit, refresh }: Watched) {
  const latest = ref<{ fitId: string; fraction: number; stage: string | null } | null>(null)

  function take({ name, data }: StreamEvent) {
    if (name !== 'fit.progress') return refresh()
    if (data.fitId && data.fraction !== undefined) latest.value = { fitId: data.fitId, fraction: data.fraction, stage: data.stage ?? null }
  }
  useEvents(() => [`target:${targetId()}`], take, refresh)

  return computed(() => {
    const shown = fit()
    if (!shown || (shown.state !== 'queued' && shown.state !== 'running')) return null
    if (latest.value?.fitId === shown.id) return { fraction: latest.value.fraction, stage: latest.value.stage }
    return { fraction: shown.job?.progressFraction ?? null, stage: shown.job?.progressStage ?? null }
  })
}
