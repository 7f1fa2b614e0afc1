import { afterEach, beforeEach, expect, test } from 'vitest'
import { withTransaction } from '../../../server/context/context'
import { PermanentJobError } from '../../../server/jobs/contracts/lease'
import type { Lease } from '../../../server/jobs/contracts/lease'
import { enqueueJob } from '../../../server/jobs/queue/enqueue-job'
import { cancelJobByKey } from '../../../server/jobs/queue/cancel-job'
import { defineJob } from '../../../server/jobs/runner/job-definition'
import type { JobDefinition } from '../../../server/jobs/runner/job-definition'
import { runJobsUntilIdle } from '../../../server/jobs/runner/run-until-idle'
import { JOB_CONTRACTS } from '../../../server/jobs/contracts'
import { claimJob } from '../../../server/services/jobs/claim-job'
import { recoverJobs } from '../../../server/services/jobs/end-job'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
beforeEach(async () => { house = await createTestHouse() })
afterEach(async () => { await house.close() })

const mailId = 'm'.repeat(26)
const tools = { computeFit: () => Promise.reject(new Error('no fit is computed here')), mailTransport: null }

function enqueue(uniqueKey?: string) {
  return withTransaction(house.ctx, tx => enqueueJob(tx, house.ctx, { name: 'send-mail', payload: { mailId }, ...(uniqueKey ? { uniqueKey } : {}) }))
}
function handler(handle: JobDefinition<'send-mail'>['handle'], onDead?: JobDefinition<'send-mail'>['onDead']) {
  return defineJob({ name: 'send-mail', schema: JOB_CONTRACTS['send-mail'], handle, ...(onDead ? { onDead } : {}) })
}
const run = (definition: JobDefinition<'send-mail'>) => runJobsUntilIdle(house.ctx, { definitions: [definition], tools })
const job = (id: string) => house.ctx.reads.selectFrom('job').selectAll().where('id', '=', id).executeTakeFirstOrThrow()
/** Writes as a handler does, under its lease. */
const writeUnder = (lease: Lease, name: string) => withTransaction(house.ctx, async (tx) => {
  await lease.assertHeld(tx)
  await tx.insertInto('programme').values({ id: house.ctx.ids.newId(), name, created_at: house.clock.now() }).execute()
})
const written = async () => (await house.ctx.reads.selectFrom('programme').select('name').execute()).map(row => row.name)

test('a job runs with its payload and its row tells that it is done', async () => {
  const { jobId } = await enqueue()
  const seen: unknown[] = []
  expect(await run(handler(async (_ctx, payload, lease) => {
    seen.push(payload)
    await lease.reportProgress(0.5, 'half-way')
    house.clock.advance(120)
  }))).toBe(1)
  expect(seen).toEqual([{ mailId }])
  expect(await job(jobId)).toMatchObject({ state: 'done', attempts: 1, progress_fraction: 1, progress_stage: 'half-way', elapsed_ms: 120, lease_token: null, last_error: null })
})

test('a payload that does not fit the contract is refused when it is queued, and nothing is written', async () => {
  await expect(withTransaction(house.ctx, tx => enqueueJob(tx, house.ctx, { name: 'send-mail', payload: { mailId: 'short' } }))).rejects.toThrow()
  expect(await house.ctx.reads.selectFrom('job').selectAll().execute()).toEqual([])
})

test('a job is queued once under a key, also after it is done, and again once it is cancelled or dead', async () => {
  const first = await enqueue('letter')
  expect(await enqueue('letter')).toEqual({ jobId: first.jobId, isNew: false })
  await run(handler(async () => {}))
  expect(await enqueue('letter')).toEqual({ jobId: first.jobId, isNew: false })
  const second = await enqueue('other')
  await withTransaction(house.ctx, tx => cancelJobByKey(tx, house.ctx, 'other'))
  expect((await job(second.jobId)).state).toBe('cancelled')
  expect((await enqueue('other')).isNew).toBe(true)
})

test('a job whose transaction failed is not there', async () => {
  await expect(withTransaction(house.ctx, async (tx) => {
    await enqueueJob(tx, house.ctx, { name: 'send-mail', payload: { mailId } })
    throw new Error('rolled back')
  })).rejects.toThrow('rolled back')
  expect(await run(handler(async () => {}))).toBe(0)
})

test('a failing job is tried again after growing waits, and is dead after five tries', async () => {
  const { jobId } = await enqueue()
  let deadReason = ''
  const failing = handler(async () => { throw new Error('the other side is away') }, async (_tx, _ctx, _payload, reason) => { deadReason = reason })
  const waits: number[] = []
  for (let attempt = 1; attempt <= 5; attempt++) {
    expect(await run(failing)).toBe(1)
    expect(await run(failing)).toBe(0)
    const row = await job(jobId)
    expect(row).toMatchObject({ attempts: attempt, state: attempt < 5 ? 'queued' : 'dead', last_error: 'the other side is away', lease_token: null })
    if (attempt < 5) waits.push(Date.parse(row.run_after) - house.clock.nowMs())
    house.clock.set(row.run_after > house.clock.now() ? row.run_after : house.clock.now())
  }
  expect(waits).toEqual([2_000, 16_000, 128_000, 900_000])
  expect(deadReason).toBe('the other side is away')
  const audit = await house.ctx.reads.selectFrom('audit_event').selectAll().where('event', '=', 'job.dead').execute()
  expect(audit).toMatchObject([{ subject_id: jobId, actor_kind: 'system' }])
})

test('a failure that cannot pass makes the job dead at once', async () => {
  const { jobId } = await enqueue()
  await run(handler(async () => { throw new PermanentJobError('refused for good') }))
  expect(await job(jobId)).toMatchObject({ state: 'dead', attempts: 1, last_error: 'refused for good' })
})

test('where telling what waits for a dead job fails, the job is not dead either', async () => {
  const { jobId } = await enqueue()
  const definition = handler(async () => { throw new PermanentJobError('refused') }, async () => { throw new Error('cannot tell') })
  await expect(run(definition)).rejects.toThrow('cannot tell')
  expect((await job(jobId)).state).toBe('running')
  expect(await house.ctx.reads.selectFrom('audit_event').selectAll().execute()).toEqual([])
})

test('a job whose worker fell silent is taken over once its lease has run out, and the old worker can write nothing more', async () => {
  const { jobId } = await enqueue()
  const outcomes: string[] = []
  await run(handler(async (_ctx, _payload, lease) => {
    if (lease.attempt > 1) return await writeUnder(lease, 'by the second worker')
    house.clock.advance(20_001)
    await run(handler(async (_ctx, _payload, second) => { await writeUnder(second, 'by the second worker') }))
    await writeUnder(lease, 'by the first worker').catch((error: Error) => outcomes.push(error.name))
    throw new Error('the first worker fails late')
  }))
  expect(outcomes).toEqual(['LeaseLostError'])
  expect(await written()).toEqual(['by the second worker'])
  expect(await job(jobId)).toMatchObject({ state: 'done', attempts: 2 })
})

test('a lease that is renewed is not taken over', async () => {
  await enqueue()
  let taken: unknown = 'not asked'
  await run(handler(async (_ctx, _payload, lease) => {
    house.clock.advance(15_000)
    await lease.reportProgress(0.5, 'half-way')
    house.clock.advance(15_000)
    taken = await claimJob(house.ctx, ['send-mail'])
  }))
  expect(taken).toBeNull()
})

test('a job that was cancelled while it ran can write nothing more and stays cancelled', async () => {
  const { jobId } = await enqueue('letter')
  await run(handler(async (_ctx, _payload, lease) => {
    await withTransaction(house.ctx, tx => cancelJobByKey(tx, house.ctx, 'letter'))
    await writeUnder(lease, 'too late')
  }))
  expect(await written()).toEqual([])
  expect((await job(jobId)).state).toBe('cancelled')
})

test('after a crash the next start takes up what was running, counting the try', async () => {
  const { jobId } = await enqueue()
  await claimJob(house.ctx, ['send-mail']) // and the process is gone
  expect(await run(handler(async () => {}))).toBe(0)
  expect(await recoverJobs(house.ctx)).toBe(1)
  expect(await run(handler(async () => {}))).toBe(1)
  expect(await job(jobId)).toMatchObject({ state: 'done', attempts: 2 })
})

test('a job that ends its process on every try is dead after five', async () => {
  const { jobId } = await enqueue()
  for (let crash = 0; crash < 5; crash++) {
    await claimJob(house.ctx, ['send-mail'])
    await recoverJobs(house.ctx)
  }
  let hasRun = false
  await run(handler(async () => { hasRun = true }))
  expect(hasRun).toBe(false)
  expect(await job(jobId)).toMatchObject({ state: 'dead', attempts: 5 })
})

test('a job is not run before its time', async () => {
  await withTransaction(house.ctx, tx => enqueueJob(tx, house.ctx, { name: 'send-mail', payload: { mailId }, runAfter: '2026-12-01T21:00:00.000Z' }))
  expect(await run(handler(async () => {}))).toBe(0)
  house.clock.advance(3_600_000)
  expect(await run(handler(async () => {}))).toBe(1)
})
