/** How long a worker may fall silent before another takes its job over. */
export const LEASE_MS = 20_000
/** How often a worker says that it lives. */
export const HEARTBEAT_MS = 5_000
/** A job that failed this often is dead. */
export const MAX_ATTEMPTS = 5

const FIRST_RETRY_MS = 2_000
const LAST_RETRY_MS = 15 * 60_000

/** Wait before the next try after `attempts` failed ones: 2 s, 16 s, about 2 min, 15 min. */
export function retryDelayMs(attempts: number): number {
  return Math.min(FIRST_RETRY_MS * 8 ** (attempts - 1), LAST_RETRY_MS)
}
