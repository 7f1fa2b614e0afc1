import { PROBLEMS } from '#shared/errors/problem-codes'
import type { Problem, ProblemCode, ProblemField } from '#shared/errors/problem-codes'

/** Why a call gave no answer, ready to be shown. 'no-answer': the server was not reached. */
export interface Trouble {
  code: ProblemCode | 'no-answer'
  status: number
  title: string
  detail: string
  fields: ProblemField[]
}

/** Thrown by every call of useApi. Nuxt carries statusCode and data from the server's render to the browser. */
export class ApiError extends Error {
  readonly statusCode: number
  readonly statusMessage: string
  readonly data: Trouble
  constructor(trouble: Trouble) {
    super(`${trouble.title}. ${trouble.detail}`)
    this.name = 'ApiError'
    this.statusCode = trouble.status
    this.statusMessage = trouble.title
    this.data = trouble
  }
}

function isProblem(value: unknown): value is Problem {
  return typeof value === 'object' && value !== null && 'code' in value && String(value.code) in PROBLEMS && 'detail' in value
}

/** Reads the answer to a failed call, whatever it is, as something that can be shown. */
export function readTrouble(status: number | undefined, answer: unknown): Trouble {
  if (isProblem(answer)) {
    return { code: answer.code, status: answer.status, title: answer.title, detail: answer.detail, fields: answer.fields ?? [] }
  }
  if (status === undefined || status === 0) {
    return { code: 'no-answer', status: 503, title: 'The server did not answer', detail: 'Nothing was changed here. Check the connection and try again.', fields: [] }
  }
  return { code: 'internal', status, title: `The server answered ${status}`, detail: 'Try again; if it stays so, tell the administrator what you did and when.', fields: [] }
}

/** The trouble behind anything caught, or null where it is a programmer's error that must not be hidden. */
export function troubleOf(error: unknown): Trouble | null {
  if (error instanceof ApiError) return error.data
  const carried = typeof error === 'object' && error !== null && 'data' in error ? error.data : null
  return typeof carried === 'object' && carried !== null && 'code' in carried && 'fields' in carried ? (carried as Trouble) : null
}

/** What Nuxt's $fetch throws: an answer that is an error, or (without statusCode) no answer at all. */
function isFetchError(error: unknown): error is Error & { statusCode?: number, data?: unknown } {
  return error instanceof Error && error.name === 'FetchError'
}

interface CallOptions {
  query?: Record<string, string | number | undefined>
  body?: unknown
  /** Version seen, for If-Match. */
  version?: number
}

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'

/**
 * The one way from the app to /api/v1. Cookies of the page's request go along when the server renders; bodies are JSON;
 * a version seen goes as If-Match; every failure is an ApiError.
 */
export function useApi() {
  const request = useRequestFetch()

  async function call<Answer>(method: Method, path: string, { query, body, version }: CallOptions = {}): Promise<Answer> {
    try {
      return await request<Answer>(`/api/v1${path}`, {
        method,
        query,
        body: body === undefined ? undefined : JSON.stringify(body),
        headers: {
          ...(body !== undefined && { 'content-type': 'application/json' }),
          ...(version !== undefined && { 'if-match': `"${version}"` }),
        },
        retry: 0,
      }) as Answer
    } catch (error) {
      if (isFetchError(error)) throw new ApiError(readTrouble(error.statusCode, error.data))
      throw error
    }
  }

  return {
    get: <Answer>(path: string, query?: CallOptions['query']) => call<Answer>('GET', path, { query }),
    post: <Answer>(path: string, body: unknown, version?: number) => call<Answer>('POST', path, { body, version }),
    put: <Answer>(path: string, body?: unknown, version?: number) => call<Answer>('PUT', path, { body, version }),
    patch: <Answer>(path: string, body: unknown, version?: number) => call<Answer>('PATCH', path, { body, version }),
    remove: <Answer = void>(path: string, version?: number) => call<Answer>('DELETE', path, { version }),
  }
}
