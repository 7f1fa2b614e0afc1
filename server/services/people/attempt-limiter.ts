import type { Clock } from '../../context/clock'
import { AppError } from '../../errors/app-error'

/** Failed attempts that one key has in `WINDOW_MS`. */
export const MAX_FAILURES = 8
export const WINDOW_MS = 15 * 60 * 1000
/** Keys that are remembered; beyond it the oldest are forgotten, so that an attacker cannot fill the memory. */
const MAX_KEYS = 10_000

export interface AttemptLimiter {
  /** Throws too-many-attempts where the key has no attempt left, else counts this one: attempts at the same time count too. */
  begin(key: string, clock: Clock): void
  /** Gives the one attempt back that did not fail. */
  succeeded(key: string): void
}

/** Counts failed attempts in memory, in windows that begin with the first failure. A restart of the server forgets them. */
export function createAttemptLimiter({ maxFailures = MAX_FAILURES, maxKeys = MAX_KEYS } = {}): AttemptLimiter {
  const windows = new Map<string, { failures: number, endsMs: number }>()
  return {
    begin(key, clock) {
      const now = clock.nowMs()
      let window = windows.get(key)
      if (!window || window.endsMs <= now) {
        windows.delete(key)
        window = { failures: 0, endsMs: now + WINDOW_MS }
        windows.set(key, window)
        if (windows.size > maxKeys) windows.delete(windows.keys().next().value!)
      }
      if (window.failures >= maxFailures) {
        throw new AppError('too-many-attempts', `There were ${maxFailures} attempts that failed. Wait ${Math.ceil((window.endsMs - now) / 60_000)} minutes and try again.`)
      }
      window.failures += 1
    },
    succeeded(key) {
      const window = windows.get(key)
      if (window && window.failures > 0) window.failures -= 1
    },
  }
}
