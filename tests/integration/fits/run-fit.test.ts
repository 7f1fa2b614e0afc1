import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { fitOrbit } from '../../../fitting'
import { runFitJob } from '../../../server/jobs/definitions/run-fit.job'
import { runJobsUntilIdle } from '../../../server/jobs/runner/run-until-idle'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { withdrawBatch } from '../../../server/services/batches/withdraw-batch'
import { readFit } from '../../../server/services/fits/read-fit'
import { requestFit } from '../../../server/services/fits/request-fit'
import { claimJob } from '../../../server/services/jobs/claim-job'
import { recoverJobs } from '../../../server/services/jobs/end-job'
import type { JobTools } from '../../../server/services/jobs/job-tools'
import { LEASE_MS } from '../../../server/services/jobs/lease-terms'
import { pairFile } from '../../builders/measure-files'
import { addPairHouse, TRUE_PAIR } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { simulatePair } from '../../builders/simulated-measures'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { auditOf, uploadText } from '../../builders/uploads'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => { await house.close() })

const EPOCHS = Array.from({ length: 16 }, (_, k) => 1974.2 + 3 * k + 0.37 * (k % 4)) // not evenly spaced: even steps fit short periods as well
const FILE = pairFile(simulatePair(TRUE_PAIR, EPOCHS, { sigmaThetaDeg: 0.8, sigmaRhoArcsec: 0.012, seed: 3 }), { sigmaThetaDeg: 0.8, sigmaRhoArcsec: 0.012 })

async function send(text = FILE): Promise<{ fitId: string; batchId: string }> {
  const batch = await uploadText(pair.observer.ctx, { text, targetId: pair.target.id })
  return { fitId: (await sendBatch(pair.observer.ctx, batch.id)).fits[0]!.fitId, batchId: batch.id }
}
const compute: JobTools['computeFit'] = async (request, { onProgress }) => fitOrbit(request, onProgress)
const run = (computeFit: JobTools['computeFit'] = compute) => runJobsUntilIdle(house.ctx, { definitions: [runFitJob], tools: { computeFit, mailTransport: null } })
const seen = (fitId: string) => readFit(pair.member.ctx, fitId)

describe('the job of a fit', () => {
  it('keeps the result that the engine gives, with its hash, engine and audit row, and tells the open pages', async () => {
    const { fitId } = await send()
    await run()
    const fit = await seen(fitId)
    expect(fit).toMatchObject({ state: 'done', refusal: null, finishedAt: house.clock.now(), job: { state: 'done', attempts: 1, progressFraction: 1 } })
    expect(fit.headline).toBe(fit.result!.conic!.statement)
    expect(fit.result!.elements.period!.value).toBeGreaterThan(55)
    expect(fit.result!.elements.period!.value).toBeLessThan(70)
    expect(fit.inputHash).toMatch(/^[0-9a-f]{64}$/)
    expect(await auditOf(house, 'fit.done')).toMatchObject([{ subject_id: fitId, actor_id: null, detail: { number: 1, inputHash: fit.inputHash, engineVersion: fit.engineVersion } }])
    const told = house.events.map(({ event }) => event).filter(event => event.topic === `fit:${fitId}`)
    expect(told.map(event => event.data.state ?? event.data.stage)).toEqual(['queued', 'running', 'reading', 'done'])
  })

  it('passes progress on at once and then at most every quarter of a second', async () => {
    const { fitId } = await send()
    await run(async (request, { onProgress }) => {
      for (let step = 0; step < 10; step++) {
        onProgress({ stage: 'searching', fraction: step / 10 })
        house.clock.advance(100)
      }
      return fitOrbit(request)
    })
    const fractions = house.events.filter(({ event }) => event.name === 'fit.progress' && event.topic === `fit:${fitId}`).map(({ event }) => event.data.fraction)
    expect(fractions).toEqual([0, 0.3, 0.6, 0.9])
    expect((await house.ctx.reads.selectFrom('job').select('progress_stage').where('name', '=', 'run-fit').executeTakeFirstOrThrow()).progress_stage).toBe('searching')
  })

  it('ends as failed with the reason in plain words where no fit can be made, and is not tried again', async () => {
    const { fitId } = await send('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n2020.1,41,1.2\n')
    await run()
    const fit = await seen(fitId)
    expect(fit).toMatchObject({ state: 'failed', result: null, refusal: { code: 'one-epoch' }, job: { state: 'done', attempts: 1 } })
    expect(fit.headline).toBe(fit.refusal!.sentence)
    expect(await auditOf(house, 'fit.done', 'fit.failed')).toMatchObject([{ event: 'fit.failed', detail: { refusal: 'one-epoch' } }])
  })

  it('is tried again after its worker died, and keeps one fit and one audit row', async () => {
    const { fitId } = await send()
    let calls = 0
    await run(async (request) => {
      if (calls++ === 0) throw new Error('the worker died')
      return fitOrbit(request)
    })
    expect(await seen(fitId)).toMatchObject({ state: 'running', job: { state: 'queued', attempts: 1 } })
    house.clock.advance(60_000)
    await run(async request => fitOrbit(request))
    expect(await seen(fitId)).toMatchObject({ state: 'done', job: { state: 'done', attempts: 2 } })
    expect(await auditOf(house, 'fit.done')).toHaveLength(1)
  })

  it('is recovered after the server died in the middle, with two attempts, one fit and one audit row', async () => {
    const { fitId } = await send()
    await claimJob(house.ctx, ['run-fit']) // a server that never comes back
    expect(await run()).toBe(0)
    await recoverJobs(house.ctx)
    expect(await run()).toBe(1)
    expect(await seen(fitId)).toMatchObject({ state: 'done', number: 1, job: { attempts: 2 } })
    expect(await auditOf(house, 'fit.done')).toHaveLength(1)
    expect(await house.ctx.reads.selectFrom('fit').select('id').execute()).toHaveLength(1)
  })

  it('cannot write once another worker holds the lease', async () => {
    const { fitId } = await send()
    let isFirst = true
    await run(async (request) => {
      if (!isFirst) return fitOrbit(request)
      isFirst = false
      house.clock.advance(LEASE_MS + 1)
      await run() // the second worker finishes while the first still computes
      return { ok: false, refusal: { code: 'no-orbit-found', sentence: 'Too late.', remedy: 'None.' } }
    })
    expect(await seen(fitId)).toMatchObject({ state: 'done', refusal: null, job: { attempts: 2 } })
    expect(await auditOf(house, 'fit.done', 'fit.failed')).toHaveLength(1)
  })

  it('writes nothing onto a fit that was superseded while it was computed', async () => {
    const { fitId, batchId } = await send()
    await run(async (request) => {
      await withdrawBatch(pair.observer.ctx, { batchId, targetId: pair.target.id })
      return fitOrbit(request)
    })
    expect(await seen(fitId)).toMatchObject({ state: 'superseded', result: null, job: { state: 'cancelled' } })
    expect(await auditOf(house, 'fit.done')).toEqual([])
  })

  it('that dies on every try leaves a failed fit that says so, and the very same can be asked for again', async () => {
    const { fitId } = await send()
    for (let attempt = 0; attempt < 5; attempt++) {
      await run(async () => { throw new Error('the worker died') })
      house.clock.advance(3_600_000)
    }
    expect(await seen(fitId)).toMatchObject({ state: 'failed', refusal: { code: 'worker-failed' }, job: { state: 'dead', attempts: 5 } })
    expect(await auditOf(house, 'fit.failed', 'job.dead')).toHaveLength(2)
    const again = await requestFit(pair.coordinator.ctx, pair.target.id, { baseFitId: fitId, setAside: [] })
    await run()
    expect(await seen(again.fit.id)).toMatchObject({ number: 2, state: 'done', job: { attempts: 1 } })
  })
})
