import type { H3Event } from 'h3'
import { AppError, notFound } from '../errors/app-error'

/** For what no route takes: throws method-not-allowed for a known address under another method, else not-found. */
export function refuseUnknown(event: H3Event): never {
  const pattern = event.context.matchedRoute?.path
  if (pattern !== undefined && !pattern.endsWith('**')) {
    throw new AppError('method-not-allowed', `${event.method} is not a method of this address. Use one that it takes, such as GET for reading.`)
  }
  throw notFound()
}
