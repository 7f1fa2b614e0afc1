import type { FitSummary, FitView } from '#shared/schemas/fits'
import type { TargetView } from '#shared/schemas/targets'
import { useApi } from './useApi'
import { useEvents } from './useEvents'

/**
 * The newest fit of a target, as it goes: read once, then followed by the event stream; after a break, or on coming back to
 * the page, read anew from the job's row.
 */
export function useFitProgress(targetId: string, onFinished: () => void) {
  const api = useApi()
  const fit = ref<FitSummary | null>(null)
  const progress = ref<{ fraction: number | null, stage: string | null }>({ fraction: null, stage: null })
  const isGoing = computed(() => fit.value?.state === 'queued' || fit.value?.state === 'running')

  async function read() {
    const wasGoing = isGoing.value
    fit.value = (await api.get<TargetView>(`/targets/${targetId}`)).latestFit
    if (isGoing.value && fit.value) {
      const { job } = await api.get<FitView>(`/fits/${fit.value.id}`)
      if (job) progress.value = { fraction: job.progressFraction, stage: job.progressStage }
    } else if (wasGoing) onFinished()
  }

  const { state: streamState } = useEvents([`target:${targetId}`], (event) => {
    if (event.name === 'fit.progress') progress.value = { fraction: event.data.fraction ?? null, stage: event.data.stage ?? null }
    if (event.name !== 'fit.progress' || !isGoing.value) void read()
  }, () => void read())
  onMounted(() => void read())

  return { fit, progress, isGoing, streamState }
}
