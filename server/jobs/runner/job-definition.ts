import type { Context, Tx } from '../../context/context'
import type { Schema } from '#shared/schemas/parse'
import type { JobTools } from '../../services/jobs/job-tools'
import type { JobName, JobPayload } from '../contracts'
import type { Lease } from '../contracts/lease'

/**
 * A job: its name, the schema of its payload and its handler. A handler is a route without HTTP: it calls services, and every
 * transaction in which it writes begins with `lease.assertHeld(tx)`. It must bear being run again after a crash at any point.
 * Throwing has it tried again later, five times in all; a PermanentJobError makes the job dead at once.
 */
export interface JobDefinition<Name extends JobName = JobName> {
  name: Name
  schema: Schema<JobPayload<Name>>
  /** How many of these one server runs at the same time; 1 by default. */
  atOnce?: number
  handle(ctx: Context, payload: JobPayload<Name>, lease: Lease, tools: JobTools): Promise<void>
  /** Runs in the transaction that declares the job dead, so that what waits for it is told. */
  onDead?(tx: Tx, ctx: Context, payload: JobPayload<Name>, reason: string): Promise<void>
}

/** A definition of any name, as lists hold them. */
export type AnyJobDefinition = { [Name in JobName]: JobDefinition<Name> }[JobName]

/** Keeps the payload's type while the definition is written. */
export function defineJob<Name extends JobName>(definition: JobDefinition<Name>): JobDefinition<Name> {
  return definition
}
