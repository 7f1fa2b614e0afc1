import type { Clock } from '../../server/context/clock'

export interface FakeClock extends Clock {
  advance(milliseconds: number): void
  set(iso: string): void
}

/** A clock that stands still until it is told. */
export function createFakeClock(startAt: string): FakeClock {
  let nowMs = Date.parse(startAt)
  return {
    now: () => new Date(nowMs).toISOString(),
    nowMs: () => nowMs,
    advance: milliseconds => void (nowMs += milliseconds),
    set: iso => void (nowMs = Date.parse(iso)),
  }
}
