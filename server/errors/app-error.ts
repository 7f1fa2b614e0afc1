import { PROBLEMS } from '#shared/errors/problem-codes'
import type { ProblemCode, ProblemField } from '#shared/errors/problem-codes'

/** The one error a service throws on purpose: a code of the closed list and a sentence on what is wrong and what to do. */
export class AppError extends Error {
  readonly code: ProblemCode
  readonly detail: string
  readonly fields: ProblemField[] | undefined

  constructor(code: ProblemCode, detail: string, options: { fields?: ProblemField[], cause?: unknown } = {}) {
    super(`${PROBLEMS[code].title}: ${detail}`, { cause: options.cause })
    this.name = 'AppError'
    this.code = code
    this.detail = detail
    this.fields = options.fields
  }
}

/** For what does not exist and for what the actor may not see or do: both answer alike. */
export function notFound(): AppError {
  return new AppError('not-found', 'There is nothing here, or it is not open to you. Check the address, or sign in with an account that may use it.')
}

export function signInRequired(): AppError {
  return new AppError('sign-in-required', 'This is open to signed-in people only. Sign in and try again.')
}

export function wrongState(detail: string): AppError {
  return new AppError('wrong-state', detail)
}

export function changedMeanwhile(detail = 'What you saw is no longer the newest state. Load it again, look at what changed, and decide anew; nothing was written.'): AppError {
  return new AppError('changed-meanwhile', detail)
}

export function inputInvalid(fields: ProblemField[]): AppError {
  const named = fields.slice(0, 3).map(({ path, reason }) => path ? `${path}: ${reason}` : reason).join('; ')
  const more = fields.length > 3 ? `; and ${fields.length - 3} more` : ''
  return new AppError('input-invalid', `${named}${more}. Mend this and send it again; nothing was written.`, { fields })
}
