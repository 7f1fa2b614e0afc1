import { isoAfter } from '../../context/clock'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import type { JobName } from '../../jobs/contracts'
import { findRunnableJob, updateJob } from '../../repositories/job-repository'
import { LEASE_MS } from './lease-terms'

/** A job that this worker holds, until its token is replaced in the row. */
export interface HeldJob {
  id: string
  name: JobName
  payload: string
  /** 1 for the first try. */
  attempt: number
  leaseToken: string
  claimedMs: number
}

/** Takes the next job that may run, also one whose worker fell silent; null where there is none. For the job runner only. */
export async function claimJob(ctx: Context, names: readonly JobName[]): Promise<HeldJob | null> {
  // Asked first on the read connection, so that looking for work takes no write lock.
  if (!await findRunnableJob(ctx.reads, ctx.clock.now(), names)) return null
  return await withTransaction(ctx, async (tx) => {
    const job = await findRunnableJob(tx, ctx.clock.now(), names)
    if (!job) return null
    const leaseToken = ctx.ids.newToken()
    const attempt = job.attempts + 1
    await updateJob(tx, job.id, { state: 'running', attempts: attempt, lease_token: leaseToken, lease_until: isoAfter(ctx.clock, LEASE_MS) })
    return { id: job.id, name: job.name as JobName, payload: job.payload, attempt, leaseToken, claimedMs: ctx.clock.nowMs() }
  })
}
