import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { readFit } from '../../../server/services/fits/read-fit'
import { requestFit } from '../../../server/services/fits/request-fit'
import { readTarget } from '../../../server/services/targets/read-target'
import type { FitView } from '../../../shared/schemas/fits'
import { addPerson, addProgramme } from '../../builders/people'
import { addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { auditOf, countRows } from '../../builders/uploads'
import { addTarget, latestFit, rule, runJobs } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
let fit: FitView
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
  fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
})
afterEach(async () => { await house.close() })

const ask = (measureIds: string[], { base = fit, reason = 'Clouds; the seeing was bad.' } = {}) =>
  requestFit(pair.coordinator.ctx, pair.target.id, { baseFitId: base.id, setAside: measureIds.map(measureId => ({ measureId, reason })) })
const asked = async (measureIds: string[], base = fit) => {
  const { fit: { id } } = await ask(measureIds, { base })
  await runJobs(house.ctx)
  return await readFit(pair.coordinator.ctx, id)
}
const one = () => fit.measures[3]!.id
const two = () => fit.measures[7]!.id

describe('asking for a refit', () => {
  it('leaves out what is set aside, with reason and name, and records it', async () => {
    const refit = await asked([one()])
    expect(refit).toMatchObject({ number: 2, state: 'done', cause: 'refit', requestedBy: 'Mirelle Tasque', newMeasures: 20 })
    expect(refit.measures.filter(measure => measure.role === 'set-aside')).toMatchObject([{ id: one(), reason: 'Clouds; the seeing was bad.', decidedBy: 'Mirelle Tasque' }])
    expect(refit.result!.statistics).toMatchObject({ measures: 20, used: 19 })
    expect(refit.result!.residuals.find(residual => residual.id === one())).toMatchObject({ status: 'set-aside' })
    expect(await auditOf(house, 'measure.set-aside')).toMatchObject([{ subject_id: one(), actor_id: pair.coordinator.id, detail: { fitId: refit.id, reason: 'Clouds; the seeing was bad.' } }])
  })

  it('takes the place of the waiting fit, with its batches', async () => {
    const refit = await asked([one()])
    expect(await readFit(pair.coordinator.ctx, fit.id)).toMatchObject({ state: 'superseded', mayRule: false })
    expect(refit).toMatchObject({ mayRule: true, batches: [{ number: 1, state: 'sent' }] })
  })

  it('records only what changed against the fit it starts from: newly set aside, and taken back', async () => {
    const second = await asked([one()])
    const third = await asked([two()], second)
    expect(third.measures.filter(measure => measure.role === 'set-aside').map(measure => measure.id)).toEqual([two()])
    expect(await auditOf(house, 'measure.set-aside', 'measure.taken-back')).toMatchObject([
      { event: 'measure.set-aside', subject_id: one() }, { event: 'measure.set-aside', subject_id: two() }, { event: 'measure.taken-back', subject_id: one() },
    ])
  })

  it('answers the fit that is there where the very same was asked before', async () => {
    const refit = await ask([one()])
    const before = await countRows(house)
    expect(await ask([one()])).toMatchObject({ isNew: false, fit: { id: refit.fit.id } })
    expect(await countRows(house)).toEqual(before)
  })

  it('takes a result over that was computed before, without computing it again', async () => {
    const second = await asked([one()])
    const back = await ask([], { base: second })
    expect(back).toMatchObject({ isNew: true, fit: { number: 3, state: 'done' } })
    const third = await readFit(pair.coordinator.ctx, back.fit.id)
    expect(third.inputHash).toBe(fit.inputHash)
    expect(third.result).toEqual(fit.result)
    expect(await runJobs(house.ctx)).toBe(0)
    expect((await auditOf(house, 'fit.done')).map(event => event.detail.number)).toEqual([1, 2, 3])
  })

  it('can try a straight line instead', async () => {
    const { fit: { id } } = await requestFit(pair.coordinator.ctx, pair.target.id, { baseFitId: fit.id, setAside: [], model: 'line' })
    await runJobs(house.ctx)
    const line = await readFit(pair.coordinator.ctx, id)
    expect(line.inputHash).not.toBe(fit.inputHash)
    expect(line.result?.model ?? line.refusal?.code).toMatch(/^(line|setting-not-available)$/)
  })

  it('gives the set-asides of an accepted fit to the fit of the next batch', async () => {
    const accepted = await rule(pair.coordinator.ctx, await asked([one()]), 'accept', 'Nothing else stands out.')
    const next = await sendPairMeasures(pair, { from: 2024.6, count: 3, seed: 5, stepYr: 0.4 })
    expect(next).toMatchObject({ newMeasures: 3 })
    expect(next.measures.filter(measure => measure.role === 'set-aside')).toMatchObject([{ id: one(), reason: 'Clouds; the seeing was bad.', decidedBy: 'Mirelle Tasque' }])
    expect(accepted.measures).toHaveLength(20)
  })
})

describe('asking for a refit is refused, with nothing written,', () => {
  it('for a measure that does not stand with this target, and for a fit of another target', async () => {
    const other = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 7 AB' })
    const before = await countRows(house)
    await expect(ask(['a'.repeat(26)])).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'setAside.0.measureId' }] })
    await expect(requestFit(pair.coordinator.ctx, other.id, { baseFitId: fit.id, setAside: [] })).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'baseFitId' }] })
    await expect(requestFit(pair.coordinator.ctx, other.id, { setAside: [] })).rejects.toMatchObject({ code: 'wrong-state' })
    expect(await countRows(house)).toEqual(before)
  })

  it('to everybody but the coordinators of the programme', async () => {
    const southern = await addProgramme(house, { name: 'Southern pairs' })
    const elsewhere = await addPerson(house, { displayName: 'R. Quellmann', coordinatorOf: [southern.id] })
    const before = await countRows(house)
    for (const ctx of [house.ctx, pair.member.ctx, pair.observer.ctx, elsewhere.ctx]) {
      await expect(requestFit(ctx, pair.target.id, { baseFitId: fit.id, setAside: [] })).rejects.toMatchObject({ code: 'not-found' })
    }
    expect(await countRows(house)).toEqual(before)
  })
})

describe('a fit', () => {
  it('is open to all who are signed in, by itself and on the sheet of its target, and to nobody else', async () => {
    expect((await readFit(pair.member.ctx, fit.id)).measures).toHaveLength(20)
    expect((await readTarget(pair.member.ctx, pair.target.id, fit.id)).fit).toEqual(await readFit(pair.member.ctx, fit.id))
    await expect(readFit(house.ctx, fit.id)).rejects.toMatchObject({ code: 'not-found' })
    await expect(readFit(pair.member.ctx, 'a'.repeat(26))).rejects.toMatchObject({ code: 'not-found' })
  })

  it('says which rules for publishing are not met, and offers publishing only where they are', async () => {
    await house.database.db.updateTable('programme').set({ least_measures: 21 }).execute()
    const accepted = await rule(pair.coordinator.ctx, await latestFit(pair.coordinator.ctx, pair.target.id), 'accept', 'Nothing stands out.')
    expect(accepted).toMatchObject({ mayPublish: false, unmetRules: [expect.stringMatching(/at least 21 measures; 20 are used/) as string] })
    await house.database.db.updateTable('programme').set({ least_measures: 20 }).execute()
    expect(await readFit(pair.coordinator.ctx, fit.id)).toMatchObject({ mayPublish: true, unmetRules: [] })
    expect(await readFit(pair.observer.ctx, fit.id)).toMatchObject({ mayPublish: false })
  })
})
