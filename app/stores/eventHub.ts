import { defineStore } from 'pinia'
import { ref } from 'vue'
import type { StreamEvent } from '#shared/schemas/events'

export interface Listener {
  topics: string[]
  onEvent: (event: StreamEvent) => void
  /** The stream was open, broke, and is open again: events may have been missed. */
  onReopen?: () => void
}

const EVENT_NAMES: StreamEvent['name'][] = ['fit.progress', 'fit.changed', 'batch.changed', 'edition.changed', 'desk.changed']
const RETRY_FIRST_MS = 1_000
const RETRY_LONGEST_MS = 30_000

/** The one event stream of a page: holds everybody's topics, opens one EventSource for all of them, and reopens it when it breaks. */
export const useEventHub = defineStore('eventHub', () => {
  const state = ref<'closed' | 'opening' | 'open' | 'broken'>('closed')
  const listeners = new Set<Listener>()
  let source: EventSource | null = null
  let openTopics = ''
  let retryMs = RETRY_FIRST_MS
  let timer: ReturnType<typeof setTimeout> | undefined

  function close() {
    clearTimeout(timer)
    source?.close()
    source = null
    openTopics = ''
    state.value = 'closed'
  }

  function deliver(message: MessageEvent<string>) {
    const event = JSON.parse(message.data) as StreamEvent
    for (const listener of [...listeners]) if (listener.topics.includes(event.topic)) listener.onEvent(event)
  }

  function open(topics: string, isReopening: boolean) {
    source?.close()
    openTopics = topics
    state.value = isReopening ? 'broken' : 'opening'
    const stream = new EventSource(`/api/v1/events?topics=${encodeURIComponent(topics)}`)
    source = stream
    let wasBroken = isReopening
    stream.onopen = () => {
      retryMs = RETRY_FIRST_MS
      state.value = 'open'
      if (wasBroken) for (const listener of [...listeners]) listener.onReopen?.()
      wasBroken = false
    }
    // The browser retries a dropped connection by itself (with Last-Event-ID); a refused one it gives up, and that is ours.
    stream.onerror = () => {
      state.value = 'broken'
      wasBroken = true
      if (stream.readyState !== EventSource.CLOSED || source !== stream) return
      timer = setTimeout(() => open(openTopics, true), retryMs)
      retryMs = Math.min(retryMs * 2, RETRY_LONGEST_MS)
    }
    stream.onmessage = deliver
    for (const name of EVENT_NAMES) stream.addEventListener(name, deliver)
  }

  /** Opens, changes or closes the stream so that it carries what the listeners want now. */
  function settle() {
    const topics = [...new Set([...listeners].flatMap(listener => listener.topics))].sort().join(',')
    if (topics === openTopics) return
    clearTimeout(timer)
    if (topics === '') close()
    else open(topics, false)
  }

  function listen(listener: Listener): () => void {
    listeners.add(listener)
    queueMicrotask(settle)
    return () => {
      listeners.delete(listener)
      queueMicrotask(settle)
    }
  }

  return { state, listen }
})
