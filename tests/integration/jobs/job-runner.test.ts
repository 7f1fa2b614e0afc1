import { once } from 'node:events'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { withTransaction } from '../../../server/context/context'
import type { Context } from '../../../server/context/context'
import { JOB_CONTRACTS } from '../../../server/jobs/contracts'
import { enqueueJob } from '../../../server/jobs/queue/enqueue-job'
import { defineJob } from '../../../server/jobs/runner/job-definition'
import type { AnyJobDefinition, JobDefinition } from '../../../server/jobs/runner/job-definition'
import { createJobRunner } from '../../../server/jobs/runner/job-runner'
import type { JobRunner } from '../../../server/jobs/runner/job-runner'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
let ctx: Context
let runner: JobRunner
beforeEach(async () => {
  house = await createTestHouse()
  ctx = { ...house.ctx, wakeJobs: () => runner.wake() }
})
afterEach(async () => {
  await runner.stop(0)
  await house.close()
})

const id = 'm'.repeat(26)
const tools = { computeFit: () => Promise.reject(new Error('no fit is computed here')), mailTransport: null }
const mailJob = (handle: JobDefinition<'send-mail'>['handle'], atOnce = 1) => defineJob({ name: 'send-mail', schema: JOB_CONTRACTS['send-mail'], atOnce, handle })
const fitJob = (handle: JobDefinition<'run-fit'>['handle']) => defineJob({ name: 'run-fit', schema: JOB_CONTRACTS['run-fit'], handle })
const enqueueMail = () => withTransaction(ctx, tx => enqueueJob(tx, ctx, { name: 'send-mail', payload: { mailId: id } }))
const start = (...definitions: AnyJobDefinition[]) => {
  runner = createJobRunner({ ctx, definitions, tools })
  runner.start()
}
const states = async () => (await ctx.reads.selectFrom('job').select(['state', 'attempts']).orderBy('created_at').execute())

/** A promise with its own resolve. */
function gate() {
  let open!: () => void
  const opened = new Promise<void>((resolve) => { open = resolve })
  return { open, opened }
}

test('a job queued while the runner is idle is run after its commit', async () => {
  const ran = gate()
  start(mailJob(async () => ran.open()))
  await enqueueMail()
  await ran.opened
  await runner.stop()
  expect(await states()).toEqual([{ state: 'done', attempts: 1 }])
})

test('mail does not wait for a long fit', async () => {
  const [mailRan, fitMayEnd] = [gate(), gate()]
  start(fitJob(() => fitMayEnd.opened), mailJob(async () => mailRan.open()))
  await withTransaction(ctx, tx => enqueueJob(tx, ctx, { name: 'run-fit', payload: { fitId: id } }))
  await enqueueMail()
  await mailRan.opened
  fitMayEnd.open()
})

test('at most as many of one kind run at once as its definition says', async () => {
  let running = 0
  let most = 0
  const all = gate()
  let left = 6
  start(mailJob(async () => {
    most = Math.max(most, ++running)
    await new Promise(resolve => setImmediate(resolve))
    running -= 1
    if (--left === 0) all.open()
  }, 2))
  for (let count = 0; count < 6; count++) await enqueueMail()
  await all.opened
  await runner.stop()
  expect(most).toBeLessThanOrEqual(2)
  expect(await states()).toEqual(Array.from({ length: 6 }, () => ({ state: 'done', attempts: 1 })))
})

test('stopping lets a running job finish', async () => {
  const [started, mayEnd] = [gate(), gate()]
  start(mailJob(async () => {
    started.open()
    await mayEnd.opened
  }))
  await enqueueMail()
  await started.opened
  const stopped = runner.stop(60_000)
  mayEnd.open()
  await stopped
  expect(await states()).toEqual([{ state: 'done', attempts: 1 }])
})

test('a job that does not finish in time is aborted and given back, and the try does not count', async () => {
  const started = gate()
  start(mailJob(async (_ctx, _payload, lease) => {
    started.open()
    await once(lease.signal, 'abort')
    throw lease.signal.reason
  }))
  await enqueueMail()
  await started.opened
  await runner.stop(0)
  expect(await states()).toEqual([{ state: 'queued', attempts: 0 }])
})
