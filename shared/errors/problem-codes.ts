/** The closed list of error codes that the API answers with (RFC 9457 `code`), their HTTP status and title. */
export const PROBLEMS = {
  'input-invalid': { status: 422, title: 'Something in what was sent cannot be used' },
  'body-not-json': { status: 415, title: 'This address takes JSON only' },
  'body-malformed': { status: 400, title: 'The body is not well-formed JSON' },
  'body-too-large': { status: 413, title: 'The body is too large' },
  'file-type-unsupported': { status: 415, title: 'Files are sent as CSV text' },
  'file-unreadable': { status: 422, title: 'The file cannot be read as measures' },
  'kind-not-available': { status: 422, title: 'Measures of this kind cannot be uploaded yet' },
  'sign-in-required': { status: 401, title: 'Sign in first' },
  'sign-in-failed': { status: 401, title: 'E-mail address and password do not match an account' },
  'too-many-attempts': { status: 429, title: 'Too many attempts' },
  'not-found': { status: 404, title: 'Not found, or not open to you' },
  'method-not-allowed': { status: 405, title: 'This address does not take that method' },
  'invitation-unusable': { status: 410, title: 'This invitation can no longer be used' },
  'email-taken': { status: 409, title: 'There is already an account with this address' },
  'name-taken': { status: 409, title: 'This name is already taken' },
  'wrong-state': { status: 409, title: 'The state no longer allows this' },
  'changed-meanwhile': { status: 412, title: 'Somebody changed this meanwhile' },
  'version-required': { status: 428, title: 'Say which version you saw' },
  'nothing-to-send': { status: 409, title: 'There is no new good row to send' },
  'rules-not-met': { status: 409, title: "The programme's rules for publishing are not met" },
  'own-work': { status: 403, title: 'Nobody rules on their own work while another coordinator can' },
  'cross-site': { status: 403, title: 'The request came from another site' },
  'not-ready': { status: 503, title: 'The server is starting or stopping' },
  'internal': { status: 500, title: 'Something failed here' },
} as const

export type ProblemCode = keyof typeof PROBLEMS

export interface ProblemField {
  /** Dotted path in the body, or the name of a query parameter. */
  path: string
  reason: string
}

/** RFC 9457 problem details as they go over the wire (application/problem+json). */
export interface Problem {
  type: string
  title: string
  status: number
  code: ProblemCode
  /** What is wrong here, why, and what to do. */
  detail: string
  fields?: ProblemField[]
}
