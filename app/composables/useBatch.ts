import type { BatchView, SendOutcome } from '#shared/schemas/batches'
import { mendSentence } from '~/components/batch/batch-rows'
import { useAnswer } from './useAnswer'
import { useApi } from './useApi'
import { useApiData } from './useApiData'
import { useEvents } from './useEvents'

/** One upload and what can be done with it; every action leaves the newest view in `batch` and says what happened in `said`. */
export function useBatch(batchId: string) {
  const api = useApi()
  const { isBusy, trouble, run } = useAnswer()
  const said = ref('')
  const outcome = ref<SendOutcome | null>(null)
  const path = `/batches/${batchId}`
  const reading = useApiData<BatchView>(() => path)
  /** What is being discarded is not read again: the answer would be that it is not there. */
  const isLeaving = ref(false)
  const readAgain = async () => {
    if (!isLeaving.value) await (await reading).refresh()
  }
  useEvents([`batch:${batchId}`], () => void readAgain(), () => void readAgain())

  return reading.then(({ data: batch }) => {
    /** Runs an action that answers with the batch as it is afterwards. */
    async function change(action: () => Promise<BatchView>): Promise<BatchView | undefined> {
      const changed = await run(action)
      if (changed) {
        batch.value = changed
        outcome.value = null
      }
      return changed
    }

    async function mend(rowId: string, cells: Record<string, string>) {
      const changed = await change(() => api.patch<BatchView>(`${path}/rows/${rowId}`, { cells }))
      if (changed) said.value = mendSentence(changed.items.find(row => row.id === rowId))
    }

    async function send() {
      const answer = await run(() => api.post<SendOutcome>(`${path}/send`, {}))
      if (!answer) return
      outcome.value = answer
      said.value = ''
      await readAgain()
    }

    return {
      batch, isBusy, trouble, said, outcome, mend, send, readAgain,
      chooseTarget: (targetId: string) => change(() => api.put<BatchView>(`${path}/target`, { targetId })),
      withdraw: (targetId: string) => change(() => api.post<BatchView>(`${path}/withdraw`, { targetId })),
      async discard() {
        isLeaving.value = true
        await run(() => api.remove(path))
        isLeaving.value = trouble.value === null
        return isLeaving.value
      },
    }
  })
}
