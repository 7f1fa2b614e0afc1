import { AppError, notFound } from '../errors/app-error'
import { defineRoute } from '../http/define-route'

/** What no other route takes: an unknown address, or a known one under a method that it does not have. */
export default defineRoute({
  access: 'public',
  handler({ event }) {
    if (event.context.matchedRoute?.path !== '/api/**') {
      throw new AppError('method-not-allowed', `${event.method} is not a method of this address. See the list of routes for those that it takes.`)
    }
    throw notFound()
  },
})
