import type { z } from 'zod'
import { runFitSchema } from './run-fit'
import { sendMailSchema } from './send-mail'

/** Every job by name with the schema of its payload. */
export const JOB_CONTRACTS = {
  'run-fit': runFitSchema,
  'send-mail': sendMailSchema,
} as const

export type JobName = keyof typeof JOB_CONTRACTS
export type JobPayload<Name extends JobName> = z.infer<(typeof JOB_CONTRACTS)[Name]>
