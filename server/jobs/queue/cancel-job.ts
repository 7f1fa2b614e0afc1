import { findLivingJobByKey, updateJob } from '../../repositories/job-repository'
import type { Tx } from '../../repositories/connection'

/**
 * Cancels the job under a key where it has not finished: its worker loses the lease, so it can write nothing any more, and the
 * key is free again. A finished job stays as it is.
 */
export async function cancelJobByKey(tx: Tx, canceller: { clock: { now(): string } }, uniqueKey: string): Promise<void> {
  const job = await findLivingJobByKey(tx, uniqueKey)
  if (!job || job.state === 'done') return
  await updateJob(tx, job.id, { state: 'cancelled', lease_token: null, lease_until: null, finished_at: canceller.clock.now() })
}
