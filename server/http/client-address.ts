import { getRequestIP } from 'h3'
import type { H3Event } from 'h3'

/** The address of the other end of the connection, for counting attempts; never logged. */
export function clientAddressOf(event: H3Event): string {
  return getRequestIP(event) ?? 'unknown'
}
