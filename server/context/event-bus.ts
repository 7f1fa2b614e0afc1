import type { StreamEvent } from '#shared/schemas/events'

export interface NumberedEvent {
  /** Rises by one an event since the server's start. */
  seq: number
  event: StreamEvent
}

/** Carries what changed to the open pages of this process. Publish from `afterCommit`, never before. */
export interface EventBus {
  publish(event: StreamEvent): void
  /** Returns the function that ends the subscription. */
  subscribe(listener: (event: NumberedEvent) => void): () => void
  /** What came after `seq` and is still remembered, for a page that reconnects. */
  since(seq: number): NumberedEvent[]
}

const REMEMBERED_EVENTS = 500

export function createEventBus(onError: (error: unknown) => void): EventBus {
  const listeners = new Set<(event: NumberedEvent) => void>()
  const remembered: NumberedEvent[] = []
  let seq = 0
  return {
    publish(event) {
      seq += 1
      const numbered = { seq, event }
      remembered.push(numbered)
      if (remembered.length > REMEMBERED_EVENTS) remembered.shift()
      for (const listener of [...listeners]) {
        try {
          listener(numbered)
        }
        catch (error) {
          onError(error)
        }
      }
    },
    subscribe(listener) {
      listeners.add(listener)
      return () => void listeners.delete(listener)
    },
    since: after => remembered.filter(({ seq }) => seq > after),
  }
}
