import { randomBytes } from 'node:crypto'
import type { H3Event } from 'h3'

/** Names one request in log lines and in the answer to a failure. */
export function requestIdOf(event: H3Event): string {
  event.context.requestId ??= randomBytes(6).toString('hex')
  return event.context.requestId as string
}
