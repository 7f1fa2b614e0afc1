import type { Insertable, Selectable } from 'kysely'
import type { JobTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type JobRow = Selectable<JobTable>

export async function insertJob(tx: Tx, row: Insertable<JobTable>): Promise<void> {
  await tx.insertInto('job').values(row).execute()
}

export async function findJob(reads: Reads, id: string): Promise<JobRow | undefined> {
  return await reads.selectFrom('job').selectAll().where('id', '=', id).executeTakeFirst()
}

/** The job under this key that is neither dead nor cancelled; there is one at most. */
export async function findLivingJobByKey(reads: Reads, uniqueKey: string): Promise<JobRow | undefined> {
  return await reads.selectFrom('job').selectAll()
    .where('unique_key', '=', uniqueKey)
    .where('state', 'not in', ['dead', 'cancelled'])
    .executeTakeFirst()
}

/** The newest job under this key, whatever became of it. */
export async function findLatestJobByKey(reads: Reads, uniqueKey: string): Promise<JobRow | undefined> {
  return await reads.selectFrom('job').selectAll().where('unique_key', '=', uniqueKey).orderBy('created_at', 'desc').orderBy('id').limit(1).executeTakeFirst()
}

/** The oldest job that may run now: queued and due, or running under a lease that has ended. */
export async function findRunnableJob(reads: Reads, now: string, names: readonly string[]): Promise<JobRow | undefined> {
  return await reads.selectFrom('job').selectAll()
    .where('name', 'in', names)
    .where(({ or, and, eb }) => or([
      and([eb('state', '=', 'queued'), eb('run_after', '<=', now)]),
      and([eb('state', '=', 'running'), eb('lease_until', '<', now)]),
    ]))
    .orderBy('run_after').orderBy('created_at').orderBy('id')
    .limit(1)
    .executeTakeFirst()
}

export async function updateJob(tx: Tx, id: string, change: Partial<Omit<JobRow, 'id' | 'name' | 'payload' | 'created_at'>>): Promise<void> {
  await tx.updateTable('job').set(change).where('id', '=', id).execute()
}

export async function isLeaseHeld(tx: Tx, id: string, leaseToken: string): Promise<boolean> {
  const row = await tx.selectFrom('job').select('id')
    .where('id', '=', id).where('state', '=', 'running').where('lease_token', '=', leaseToken)
    .executeTakeFirst()
  return row !== undefined
}

/** Gives every running job back at once; at the start of the only server of this database none of them is alive. */
export async function endAllLeases(tx: Tx, now: string): Promise<number> {
  const outcome = await tx.updateTable('job')
    .set({ state: 'queued', lease_token: null, lease_until: null, run_after: now })
    .where('state', '=', 'running')
    .executeTakeFirst()
  return Number(outcome.numUpdatedRows)
}

/** Whether any of these jobs is queued or running, now or later. */
export async function hasUnfinishedJob(reads: Reads, names: readonly string[]): Promise<boolean> {
  const row = await reads.selectFrom('job').select('id').where('name', 'in', names).where('state', 'in', ['queued', 'running']).limit(1).executeTakeFirst()
  return row !== undefined
}
