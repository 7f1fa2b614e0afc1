import { getRequestHeader } from 'h3'
import type { H3Event } from 'h3'
import { AppError } from '../errors/app-error'

/** The version that the client saw, from If-Match: "3". Throws version-required where it is missing or not of that form. */
export function requiredVersion(event: H3Event): number {
  const header = getRequestHeader(event, 'if-match')
  const version = /^"(\d{1,9})"$/.exec(header?.trim() ?? '')
  if (!version) {
    throw new AppError('version-required', 'Send the version that you saw in the header If-Match, in quotes, such as If-Match: "3", so that nothing of others is overruled unseen.')
  }
  return Number(version[1])
}
