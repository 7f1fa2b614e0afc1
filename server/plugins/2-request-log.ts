import { defineNitroPlugin } from 'nitropack/runtime'
import { currentHouse } from '../http/house'
import { maskedPath } from '../http/masked-path'
import { requestIdOf } from '../http/request-id'

const startedMs = new WeakMap<object, number>()
/** Answered many times a minute, or once for each file of a page. */
const QUIET = /^\/(_nuxt\/|_fonts\/|healthz$|readyz$)/

/** One line a request, without personal data: no query, no secrets of links, no addresses. */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('request', (event) => {
    startedMs.set(event, performance.now())
    event.node.res.once('close', () => {
      const { statusCode, writableFinished } = event.node.res
      const route = maskedPath(event.path)
      const fields = {
        requestId: requestIdOf(event),
        method: event.method,
        route,
        status: statusCode,
        ms: Math.round(performance.now() - (startedMs.get(event) ?? performance.now())),
        ...(writableFinished ? {} : { isCutShort: true }),
      }
      const log = currentHouse()?.context.log
      if (QUIET.test(route)) log?.debug(fields, 'request')
      else log?.info(fields, 'request')
    })
  })
  nitro.hooks.hook('error', (error, { event }) => {
    if ('statusCode' in error && Number(error.statusCode) < 500) return // a wrong address is no fault of ours
    currentHouse()?.context.log.error({ err: error, ...(event ? { requestId: requestIdOf(event) } : {}) }, 'a page failed')
  })
})
