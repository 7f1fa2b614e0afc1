import type { H3Event } from 'h3'
import type { Actor } from '#shared/schemas/people'
import type { Context } from '../context/context'

/** Keeps the session's id in the sealed cookie, and nothing else. */
export interface SessionCookie {
  read(event: H3Event): Promise<string | null>
  write(event: H3Event, sessionId: string): Promise<void>
  clear(event: H3Event): Promise<void>
}

/** What routes stand on; put together in server/plugins, and by the test builders. */
export interface House {
  context: Context
  sessionCookie: SessionCookie
  /** The person behind a session row that is in force; null where it is unknown, ended or revoked. */
  actorOfSession(ctx: Context, sessionId: string): Promise<Actor | null>
}

let current: House | null = null

export function openHouse(house: House | null): void {
  current = house
}

/** null while the server starts or stops. */
export function currentHouse(): House | null {
  return current
}
