import type { Context } from '../../context/context'
import { parseBy } from '#shared/schemas/parse'
import { claimJob } from '../../services/jobs/claim-job'
import type { HeldJob } from '../../services/jobs/claim-job'
import { buryJob, finishJob, giveJobBack, retryJob } from '../../services/jobs/end-job'
import { assertLeaseHeld, renewLease } from '../../services/jobs/hold-lease'
import type { JobTools } from '../../services/jobs/job-tools'
import { HEARTBEAT_MS, MAX_ATTEMPTS } from '../../services/jobs/lease-terms'
import { LeaseLostError, PermanentJobError } from '../contracts/lease'
import type { Lease } from '../contracts/lease'
import type { AnyJobDefinition, JobDefinition } from './job-definition'

/** The reason of a lease's signal where the server stops. */
export class ServerStopping extends Error {
  constructor() {
    super('The server is stopping; the job is given back.')
    this.name = 'ServerStopping'
  }
}

export interface Workshop {
  ctx: Context
  definitions: readonly AnyJobDefinition[]
  tools: JobTools
  /** Aborted with ServerStopping when running handlers should end. */
  stopSignal: AbortSignal
}

/** Claims one job of these definitions and runs it to an outcome; false where there was none. */
export async function runOneJob(workshop: Workshop): Promise<boolean> {
  const { ctx, definitions } = workshop
  const job = await claimJob(ctx, definitions.map(definition => definition.name))
  if (!job) return false
  const definition = definitions.find(({ name }) => name === job.name) as JobDefinition
  try {
    await runHeld(workshop, definition, job)
  }
  catch (error) {
    if (!(error instanceof LeaseLostError)) throw error
    ctx.log.warn({ jobId: job.id, job: job.name, attempt: job.attempt }, 'a job was taken over or cancelled; this worker wrote nothing more')
  }
  return true
}

async function runHeld(workshop: Workshop, definition: JobDefinition, job: HeldJob): Promise<void> {
  const { ctx } = workshop
  if (job.attempt > MAX_ATTEMPTS) return await bury(ctx, definition, job, 'Its worker ended in the middle of the work, on every try.')
  const failure = await attempt(workshop, definition, job)
  if (!failure) {
    await finishJob(ctx, job)
    ctx.log.info({ jobId: job.id, job: job.name, attempt: job.attempt, elapsedMs: ctx.clock.nowMs() - job.claimedMs }, 'a job is done')
    return
  }
  const { error } = failure
  if (error instanceof LeaseLostError) throw error
  if (workshop.stopSignal.aborted) return await giveJobBack(ctx, job)
  const reason = error instanceof Error ? error.message : String(error)
  if (error instanceof PermanentJobError || job.attempt >= MAX_ATTEMPTS) return await bury(ctx, definition, job, reason)
  ctx.log.warn({ err: error, jobId: job.id, job: job.name, attempt: job.attempt }, 'a job failed and is tried again')
  await retryJob(ctx, job, reason)
}

/** Runs the handler under a heartbeat; what it threw comes back as a failure. */
async function attempt({ ctx, tools, stopSignal }: Workshop, definition: JobDefinition, job: HeldJob): Promise<{ error: unknown } | null> {
  const taken = new AbortController()
  const lease: Lease = {
    jobId: job.id,
    attempt: job.attempt,
    signal: AbortSignal.any([taken.signal, stopSignal]),
    assertHeld: tx => assertLeaseHeld(tx, job),
    reportProgress: (fraction, stage) => renewLease(ctx, job, { fraction, stage }),
  }
  const heartbeat = setInterval(() => {
    renewLease(ctx, job).catch((error: unknown) => {
      if (error instanceof LeaseLostError) taken.abort(error)
      else ctx.log.warn({ err: error, jobId: job.id }, 'a heartbeat could not be written')
    })
  }, HEARTBEAT_MS)
  try {
    await definition.handle(ctx, readPayload(definition, job), lease, tools)
    return null
  }
  catch (error) {
    return { error: taken.signal.aborted ? taken.signal.reason : error }
  }
  finally {
    clearInterval(heartbeat)
  }
}

async function bury(ctx: Context, definition: JobDefinition, job: HeldJob, reason: string): Promise<void> {
  ctx.log.error({ jobId: job.id, job: job.name, attempt: job.attempt, reason }, 'a job is dead')
  const payload = parseBy(definition.schema, JSON.parse(job.payload))
  await buryJob(ctx, job, {
    reason,
    tellWaiting: async (tx) => {
      if (payload.ok) await definition.onDead?.(tx, ctx, payload.value, reason)
    },
  })
}

function readPayload(definition: JobDefinition, job: HeldJob) {
  const payload = parseBy(definition.schema, JSON.parse(job.payload))
  if (!payload.ok) throw new PermanentJobError(`The payload of this job does not fit its schema: ${payload.fields.map(field => `${field.path} ${field.reason}`).join('; ')}.`)
  return payload.value
}
