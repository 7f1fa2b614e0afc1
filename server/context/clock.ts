export interface Clock {
  /** ISO 8601 UTC with milliseconds and Z. */
  now(): string
  /** Milliseconds since 1970. */
  nowMs(): number
}

export const systemClock: Clock = {
  now: () => new Date().toISOString(),
  nowMs: () => Date.now(),
}

/** The time `milliseconds` after the clock's now, as stored in the database. */
export function isoAfter(clock: Clock, milliseconds: number): string {
  return new Date(clock.nowMs() + milliseconds).toISOString()
}
