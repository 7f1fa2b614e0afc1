import { troubleOf } from './useApi'
import type { Trouble } from './useApi'

/**
 * One action of a page against the API: runs it, says whether it is under way, and keeps what went wrong for showing.
 * A second press while the first is under way does nothing. Errors that the API did not name are thrown on.
 */
export function useAnswer() {
  const isBusy = ref(false)
  const trouble = ref<Trouble | null>(null)

  async function run<Result>(action: () => Promise<Result>): Promise<Result | undefined> {
    if (isBusy.value) return undefined
    isBusy.value = true
    trouble.value = null
    try {
      return await action()
    } catch (error) {
      trouble.value = troubleOf(error)
      if (!trouble.value) throw error
      return undefined
    } finally {
      isBusy.value = false
    }
  }

  /** Reason for one field of the form, by its path in the body. */
  function fieldError(path: string): string | null {
    return trouble.value?.fields.find(field => field.path === path)?.reason ?? null
  }

  return { isBusy, trouble, run, fieldError }
}
