import { isoAfter } from '../../context/clock'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { LeaseLostError } from '../../jobs/contracts/lease'
import { isLeaseHeld, updateJob } from '../../repositories/job-repository'
import type { HeldJob } from './claim-job'
import { LEASE_MS } from './lease-terms'

/** Throws LeaseLostError where the row no longer bears this worker's token. For the job runner and, as Lease.assertHeld, its handlers. */
export async function assertLeaseHeld(tx: Tx, job: HeldJob): Promise<void> {
  if (!await isLeaseHeld(tx, job.id, job.leaseToken)) throw new LeaseLostError(job.id)
}

/** Says that the worker lives, with the progress where given. For the job runner only; throws LeaseLostError. */
export async function renewLease(ctx: Context, job: HeldJob, progress?: { fraction: number, stage: string }): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    await assertLeaseHeld(tx, job)
    await updateJob(tx, job.id, {
      lease_until: isoAfter(ctx.clock, LEASE_MS),
      ...(progress ? { progress_fraction: Math.min(Math.max(progress.fraction, 0), 1), progress_stage: progress.stage } : {}),
    })
  })
}
