import { setResponseHeader, setResponseStatus } from 'h3'
import type { H3Event } from 'h3'
import type { Problem } from '#shared/errors/problem-codes'
import { toProblem } from '../errors/to-problem'
import type { Log } from '../context/logger'
import { requestIdOf } from './request-id'

/** Answers problem details, and logs once what must be looked into. */
export function answerProblem(event: H3Event, error: unknown, log: Log | null): Problem | undefined {
  const requestId = requestIdOf(event)
  const { problem, isOurFault } = toProblem(error, requestId)
  if (isOurFault) log?.error({ err: error, requestId }, 'a request failed')
  if (event.node.res.headersSent) {
    event.node.res.destroy() // half an answer is out: cut it off rather than end it as if it were whole
    return undefined
  }
  // Where the body was not read to its end, the connection cannot carry another request.
  if (problem.status === 413 || problem.status === 415) setResponseHeader(event, 'Connection', 'close')
  setResponseStatus(event, problem.status)
  setResponseHeader(event, 'Content-Type', 'application/problem+json')
  return problem
}
