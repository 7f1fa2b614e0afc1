import { recordAudit } from '../../audit/record-audit'
import { isoAfter } from '../../context/clock'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { endAllLeases, updateJob } from '../../repositories/job-repository'
import type { HeldJob } from './claim-job'
import { assertLeaseHeld } from './hold-lease'
import { MAX_ATTEMPTS, retryDelayMs } from './lease-terms'

const RELEASED = { lease_token: null, lease_until: null }

/** Marks a held job as done. For the job runner only, like all of this file; each throws LeaseLostError. */
export async function finishJob(ctx: Context, job: HeldJob): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    await assertLeaseHeld(tx, job)
    await updateJob(tx, job.id, { ...RELEASED, state: 'done', progress_fraction: 1, finished_at: ctx.clock.now(), elapsed_ms: elapsedMs(ctx, job), last_error: null })
  })
}

/** Puts a failed job back, to be tried after a while. */
export async function retryJob(ctx: Context, job: HeldJob, reason: string): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    await assertLeaseHeld(tx, job)
    await updateJob(tx, job.id, { ...RELEASED, state: 'queued', run_after: isoAfter(ctx.clock, retryDelayMs(job.attempt)), last_error: reason })
  })
}

/** Puts a job back that was not finished because the server stops; the try does not count. */
export async function giveJobBack(ctx: Context, job: HeldJob): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    await assertLeaseHeld(tx, job)
    await updateJob(tx, job.id, { ...RELEASED, state: 'queued', run_after: ctx.clock.now(), attempts: job.attempt - 1 })
  })
}

/** Declares a job dead and tells what waits for it, in one transaction. Records job.dead. */
export async function buryJob(ctx: Context, job: HeldJob, { reason, tellWaiting }: { reason: string, tellWaiting: (tx: Tx) => Promise<void> }): Promise<void> {
  const attempts = Math.min(job.attempt, MAX_ATTEMPTS)
  await withTransaction(ctx, async (tx) => {
    await assertLeaseHeld(tx, job)
    await updateJob(tx, job.id, { ...RELEASED, state: 'dead', attempts, finished_at: ctx.clock.now(), elapsed_ms: elapsedMs(ctx, job), last_error: reason })
    await recordAudit(tx, ctx, { event: 'job.dead', subjectKind: 'job', subjectId: job.id, detail: { name: job.name, attempts } })
    await tellWaiting(tx)
  })
}

/** At the server's start: whatever was running under the last one may run again now. Answers how many. */
export async function recoverJobs(ctx: Context): Promise<number> {
  return await withTransaction(ctx, tx => endAllLeases(tx, ctx.clock.now()))
}

function elapsedMs(ctx: Context, job: HeldJob): number {
  return ctx.clock.nowMs() - job.claimedMs
}
