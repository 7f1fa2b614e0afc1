import { PROBLEMS } from '#shared/errors/problem-codes'
import type { Problem, ProblemCode } from '#shared/errors/problem-codes'
import { AppError } from './app-error'

/** Maps whatever was thrown to RFC 9457 problem details; `isOurFault` says that it must be looked into. */
export function toProblem(error: unknown, requestId: string): { problem: Problem, isOurFault: boolean } {
  if (error instanceof AppError) {
    return { problem: problemOf(error.code, error.detail, error.fields), isOurFault: error.code === 'internal' }
  }
  return {
    problem: problemOf('internal', `The server could not finish this; the reason is in its log under ${requestId}. Try again; if it happens again, tell the administrator that number.`),
    isOurFault: true,
  }
}

function problemOf(code: ProblemCode, detail: string, fields?: Problem['fields']): Problem {
  const { status, title } = PROBLEMS[code]
  return { type: `/problems/${code}`, title, status, code, detail, ...(fields ? { fields } : {}) }
}
