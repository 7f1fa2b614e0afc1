import type { H3Event } from 'h3'
import { signInRequired, AppError } from '../errors/app-error'
import { currentHouse } from './house'

/** Puts a session that was just started into the sealed cookie. */
export async function keepSession(event: H3Event, sessionId: string): Promise<void> {
  await cookie().write(event, sessionId)
}

export async function forgetSession(event: H3Event): Promise<void> {
  await cookie().clear(event)
}

/** The session that this request came under; defineRoute has found it to be in force. */
export function sessionIdOf(event: H3Event): string {
  const { sessionId } = event.context
  if (typeof sessionId !== 'string') throw signInRequired()
  return sessionId
}

function cookie() {
  const house = currentHouse()
  if (!house) throw new AppError('not-ready', 'The server is stopping. Try again in a few seconds.')
  return house.sessionCookie
}
