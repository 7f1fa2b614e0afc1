import type { StreamEvent } from '#shared/schemas/events'
import { useEventHub } from '~/stores/eventHub'

/**
 * Listens to topics of the server's event stream (target:ID, fit:ID, batch:ID, desk) for as long as the component lives.
 * `onReopen` runs when the stream comes back after a break: read anew what may have been missed.
 */
export function useEvents(topics: MaybeRefOrGetter<string[]>, onEvent: (event: StreamEvent) => void, onReopen?: () => void) {
  const hub = useEventHub()
  let stop: (() => void) | undefined

  function restart() {
    stop?.()
    const wanted = toValue(topics)
    stop = wanted.length > 0 ? hub.listen({ topics: wanted, onEvent, onReopen }) : undefined
  }

  onMounted(() => watch(() => toValue(topics).join(','), restart, { immediate: true }))
  onUnmounted(() => stop?.())

  return { state: computed(() => hub.state) }
}
