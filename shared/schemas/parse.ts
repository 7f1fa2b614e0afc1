import type { z } from 'zod'
import type { ProblemField } from '../errors/problem-codes'

/** A schema whose answers are of type Value. */
export type Schema<Value> = z.ZodType<Value>

/** What a schema answers: `ValueOf<typeof signInSchema>`. */
export type ValueOf<S extends z.ZodType> = z.output<S>

/** What a schema asks for, before defaults and conversions: `InputOf<typeof createTargetSchema>`. */
export type InputOf<S extends z.ZodType> = z.input<S>

export type Parsed<Value> = { ok: true, value: Value } | { ok: false, fields: ProblemField[] }

/** Reads `input` by `schema`; what cannot be used comes back as paths with reasons, in the schema's order. */
export function parseBy<Value>(schema: Schema<Value>, input: unknown): Parsed<Value> {
  const outcome = schema.safeParse(input)
  if (outcome.success) return { ok: true, value: outcome.data }
  return {
    ok: false,
    fields: outcome.error.issues.map(issue => ({
      path: issue.path.map(String).join('.'),
      reason: issue.message.endsWith('received undefined') ? 'is missing' : issue.message,
    })),
  }
}
