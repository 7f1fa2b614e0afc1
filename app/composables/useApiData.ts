import { troubleOf, useApi } from './useApi'

/**
 * Reads one address of the API for a page, in the server's render and again whenever the address changes.
 * `keep` may leave out what the page does not show, so that it is not sent a second time for the browser to begin from.
 * A read that fails ends in the error page with the API's own words: a page without its subject has nothing to show.
 */
export function useApiData<Answer>(path: () => string, query: () => Record<string, string | undefined> = () => ({}), keep: (answer: Answer) => Answer = answer => answer) {
  const api = useApi()
  const given = computed(() => Object.fromEntries(Object.entries(query()).filter(([, value]) => value)))
  const key = computed(() => `${path()}?${JSON.stringify(given.value)}`)
  const reading = useAsyncData<Answer>(key, async () => keep(await api.get<Answer>(path(), given.value)))

  const failure = () => reading.error.value && createError({
    statusCode: reading.error.value.statusCode,
    statusMessage: reading.error.value.statusMessage,
    data: troubleOf(reading.error.value),
    fatal: true,
  })
  watch(reading.error, () => {
    const error = failure()
    if (error) showError(error)
  })

  return reading.then(() => {
    const error = failure()
    if (error) throw error
    return { data: reading.data as Ref<Answer>, refresh: reading.refresh }
  })
}
