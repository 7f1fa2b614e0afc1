import { getCookie } from 'h3'
import { clearUserSession, getUserSession, setUserSession, useRuntimeConfig } from '#imports'
import type { SessionCookie } from './house'

/** As long as a session row may live; the row decides, not the cookie. */
const MAX_AGE_S = 30 * 24 * 3600

/** The sealed cookie of nuxt-auth-utils. It is marked secure where people come over https, which plain http could not store. */
export function createSessionCookie(baseUrl: string): SessionCookie {
  const config = { maxAge: MAX_AGE_S, cookie: { secure: baseUrl.startsWith('https:') } }
  return {
    async read(event) {
      // Asking for a session where no cookie came would set one.
      if (!getCookie(event, useRuntimeConfig(event).session.name ?? 'semilatus')) return null
      const session = await getUserSession(event)
      const sessionId = session.secure?.sessionId
      return typeof sessionId === 'string' ? sessionId : null
    },
    async write(event, sessionId) {
      await setUserSession(event, { secure: { sessionId } }, config)
    },
    async clear(event) {
      await clearUserSession(event, config)
    },
  }
}
