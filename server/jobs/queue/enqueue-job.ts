import { findLivingJobByKey, insertJob } from '../../repositories/job-repository'
import type { Tx } from '../../repositories/connection'
import { JOB_CONTRACTS } from '../contracts'
import type { JobName, JobPayload } from '../contracts'

/** The part of the context that queueing needs. */
export interface Enqueuer {
  clock: { now(): string }
  ids: { newId(): string }
  afterCommit(action: () => void): void
  wakeJobs(): void
}

export interface NewJob<Name extends JobName> {
  name: Name
  payload: JobPayload<Name>
  /** At most one job that is not dead or cancelled exists under a key, finished ones included. */
  uniqueKey?: string
  /** Not before this time (ISO 8601); now by default. */
  runAfter?: string
}

/** Writes a job in the transaction of the change that needs it; under a key that is taken, answers the job that is there. */
export async function enqueueJob<Name extends JobName>(tx: Tx, enqueuer: Enqueuer, job: NewJob<Name>): Promise<{ jobId: string, isNew: boolean }> {
  const payload = JOB_CONTRACTS[job.name].parse(job.payload)
  if (job.uniqueKey !== undefined) {
    const living = await findLivingJobByKey(tx, job.uniqueKey)
    if (living) return { jobId: living.id, isNew: false }
  }
  const jobId = enqueuer.ids.newId()
  const now = enqueuer.clock.now()
  await insertJob(tx, {
    id: jobId,
    name: job.name,
    payload: JSON.stringify(payload),
    unique_key: job.uniqueKey ?? null,
    state: 'queued',
    run_after: job.runAfter ?? now,
    lease_token: null,
    lease_until: null,
    progress_stage: null,
    elapsed_ms: null,
    last_error: null,
    created_at: now,
    finished_at: null,
  })
  enqueuer.afterCommit(enqueuer.wakeJobs)
  return { jobId, isNew: true }
}
