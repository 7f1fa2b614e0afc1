import { createPinia, setActivePinia } from 'pinia'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { useEventHub } from '../../../../app/stores/eventHub'

/** Stands in for the browser's EventSource: the test opens, breaks and feeds it. */
class FakeSource {
  static readonly CLOSED = 2
  static made: FakeSource[] = []
  readyState = 0
  onopen: (() => void) | null = null
  onerror: (() => void) | null = null
  onmessage: ((message: { data: string }) => void) | null = null
  readonly handlers = new Map<string, (message: { data: string }) => void>()
  constructor(readonly url: string) { FakeSource.made.push(this) }
  addEventListener(name: string, handler: (message: { data: string }) => void) { this.handlers.set(name, handler) }
  close() { this.readyState = FakeSource.CLOSED }
  open() { this.readyState = 1; this.onopen?.() }
  refuse() { this.readyState = FakeSource.CLOSED; this.onerror?.() }
  say(name: string, topic: string) { this.handlers.get(name)?.({ data: JSON.stringify({ topic, name, data: {} }) }) }
}
const live = () => FakeSource.made.filter(source => source.readyState !== FakeSource.CLOSED)
const tick = () => Promise.resolve()

beforeEach(() => {
  setActivePinia(createPinia())
  FakeSource.made = []
  vi.stubGlobal('EventSource', FakeSource)
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
  vi.unstubAllGlobals()
})

describe('the event stream of a page', () => {
  it('two listeners share one stream that carries the topics of both', async () => {
    const hub = useEventHub()
    hub.listen({ topics: ['target:b'], onEvent: () => {} })
    hub.listen({ topics: ['desk', 'target:b'], onEvent: () => {} })
    await tick()
    expect(live().map(source => decodeURIComponent(source.url))).toEqual(['/api/v1/events?topics=desk,target:b'])
  })

  it('an event reaches those who asked for its topic and nobody else', async () => {
    const hub = useEventHub()
    const [desk, target] = [vi.fn(), vi.fn()]
    hub.listen({ topics: ['desk'], onEvent: desk })
    hub.listen({ topics: ['target:a'], onEvent: target })
    await tick()
    live()[0]!.say('desk.changed', 'desk')
    expect(desk).toHaveBeenCalledOnce()
    expect(target).not.toHaveBeenCalled()
  })

  it('the stream closes when the last listener leaves', async () => {
    const hub = useEventHub()
    const stop = hub.listen({ topics: ['desk'], onEvent: () => {} })
    await tick()
    stop()
    await tick()
    expect(live()).toEqual([])
    expect(hub.state).toBe('closed')
  })

  it('a refused stream is tried again, later each time, and listeners hear when it is back', async () => {
    const hub = useEventHub()
    const onReopen = vi.fn()
    hub.listen({ topics: ['desk'], onEvent: () => {}, onReopen })
    await tick()
    FakeSource.made[0]!.open()
    FakeSource.made[0]!.refuse()
    expect(hub.state).toBe('broken')
    vi.advanceTimersByTime(1_000)
    FakeSource.made[1]!.refuse()
    vi.advanceTimersByTime(1_000)
    expect(FakeSource.made).toHaveLength(2)
    vi.advanceTimersByTime(1_000)
    FakeSource.made[2]!.open()
    expect(onReopen).toHaveBeenCalledOnce()
    expect(hub.state).toBe('open')
  })

  it('a first opening is not taken for a return', async () => {
    const onReopen = vi.fn()
    useEventHub().listen({ topics: ['desk'], onEvent: () => {}, onReopen })
    await tick()
    FakeSource.made[0]!.open()
    expect(onReopen).not.toHaveBeenCalled()
  })
})
