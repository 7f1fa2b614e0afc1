import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { mendRow } from '../../../server/services/batches/mend-row'
import { readBatch } from '../../../server/services/batches/read-batch'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { listDesk } from '../../../server/services/desk/list-desk'
import { ruleOnFit } from '../../../server/services/desk/rule-on-fit'
import { readFit } from '../../../server/services/fits/read-fit'
import { requestFit } from '../../../server/services/fits/request-fit'
import { readTarget } from '../../../server/services/targets/read-target'
import type { Decision } from '../../../shared/schemas/fits'
import { addPerson } from '../../builders/people'
import { addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { auditOf, countRows, uploadText } from '../../builders/uploads'
import { latestFit, publish, rule, runJobs } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => { await house.close() })

const REASON = 'The residuals show nothing that stands out.'
const sendTwenty = () => sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
const standing = async () => (await readTarget(pair.member.ctx, pair.target.id, null)).measures.length

describe('accepting a fit', () => {
  it('settles the fit and the part of the batch together, records both and tells the owner', async () => {
    const fit = await sendTwenty()
    const ruled = await rule(pair.coordinator.ctx, fit, 'accept', REASON)
    expect(ruled).toMatchObject({
      state: 'accepted', version: fit.version + 1, mayRule: false, mayPublish: true, unmetRules: [],
      rulings: [{ decision: 'accept', reason: REASON, personName: 'Mirelle Tasque' }], batches: [{ state: 'accepted' }],
    })
    expect((await readBatch(pair.observer.ctx, fit.batches[0]!.id)).parts).toMatchObject([{ state: 'accepted', lastReason: REASON }])
    expect(await auditOf(house, 'fit.accepted', 'batch.accepted')).toMatchObject([
      { event: 'fit.accepted', subject_id: fit.id, actor_id: pair.coordinator.id, detail: { number: 1, decision: 'accept', reason: REASON } },
      { event: 'batch.accepted', subject_id: fit.batches[0]!.id, detail: { number: 1, fitId: fit.id } },
    ])
    const letters = await house.ctx.reads.selectFrom('mail_out').select(['person_id', 'template']).where('template', '=', 'ruling-made').execute()
    expect(letters).toEqual([{ person_id: pair.observer.id, template: 'ruling-made' }])
  })

  it('makes the measures old ones: the next fit adds to them and is compared with the edition in force', async () => {
    const first = await rule(pair.coordinator.ctx, await sendTwenty(), 'accept', REASON)
    await publish(pair.coordinator.ctx, first)
    const second = await sendPairMeasures(pair, { from: 2024.6, count: 4, seed: 5, stepYr: 0.4 })
    expect(second).toMatchObject({ number: 2, state: 'done', newMeasures: 4 })
    expect(second.measures.filter(measure => measure.isNew)).toHaveLength(4)
    expect(Object.keys(second.changeInSigma!)).toContain('period')
    expect(Math.abs(second.changeInSigma!.eccentricity!)).toBeLessThan(6)
  })
})

describe('returning a fit', () => {
  it('gives the batch back as a draft with the reason, and its measures stand no longer', async () => {
    const fit = await sendTwenty()
    const ruled = await rule(pair.coordinator.ctx, fit, 'return', 'θ seems to be counted from south.')
    expect(ruled).toMatchObject({ state: 'declined', batches: [{ state: 'returned' }] })
    const batch = await readBatch(pair.observer.ctx, fit.batches[0]!.id)
    expect(batch).toMatchObject({ good: 20, sent: 0, parts: [{ state: 'returned', lastReason: 'θ seems to be counted from south.' }] })
    expect(await standing()).toBe(0)
    expect(await auditOf(house, 'fit.returned', 'batch.returned')).toMatchObject([{ event: 'fit.returned' }, { event: 'batch.returned', detail: { reason: 'θ seems to be counted from south.' } }])
  })

  it('lets the owner mend and send once more', async () => {
    const fit = await sendTwenty()
    await rule(pair.coordinator.ctx, fit, 'return', 'Row 2 looks mistyped.')
    const { id, items: [row] } = await readBatch(pair.observer.ctx, fit.batches[0]!.id)
    const mended = await mendRow(pair.observer.ctx, { batchId: id, rowId: row!.id, cells: { theta_deg: '200' } })
    expect(mended.parts[0]!.state).toBe('draft')
    expect(await sendBatch(pair.observer.ctx, id)).toMatchObject({ sent: 20, alreadyHere: 0 })
    await runJobs(house.ctx)
    expect(await latestFit(pair.coordinator.ctx, pair.target.id)).toMatchObject({ number: 2, state: 'done', newMeasures: 20, mayRule: true })
    expect((await readBatch(pair.observer.ctx, id)).parts[0]).toMatchObject({ state: 'sent', lastReason: null })
  })
})

describe('declining a fit', () => {
  it('ends the part of the batch; what was accepted before goes on standing', async () => {
    await rule(pair.coordinator.ctx, await sendTwenty(), 'accept', REASON)
    const second = await sendPairMeasures(pair, { from: 2024.6, count: 4, seed: 5, stepYr: 0.4 })
    const ruled = await rule(pair.coordinator.ctx, second, 'decline', 'A different pair.')
    expect(ruled).toMatchObject({ state: 'declined', batches: [{ state: 'declined' }] })
    expect(await standing()).toBe(20)
    expect((await readBatch(pair.observer.ctx, second.batches[0]!.id))).toMatchObject({ sent: 4, good: 0 })
    await expect(sendBatch(pair.observer.ctx, second.batches[0]!.id)).rejects.toMatchObject({ code: 'nothing-to-send' })
  })
})

describe('a fit that failed', () => {
  it('has nothing to accept, can be returned once, and then leaves the desk', async () => {
    const fit = await sendPairMeasures(pair, { from: 2010, count: 3, seed: 1 })
    expect(fit).toMatchObject({ state: 'failed', refusal: { code: 'too-few-measures' }, mayRule: true, mayPublish: false })
    await expect(rule(pair.coordinator.ctx, fit, 'accept', REASON)).rejects.toMatchObject({ code: 'wrong-state' })
    expect(await rule(pair.coordinator.ctx, fit, 'return', 'Too few to judge.')).toMatchObject({ state: 'failed', mayRule: false, batches: [{ state: 'returned' }] })
    expect(await listDesk(pair.coordinator.ctx)).toEqual([])
    await expect(rule(pair.coordinator.ctx, await readFit(pair.coordinator.ctx, fit.id), 'decline', 'Again.')).rejects.toMatchObject({ code: 'wrong-state' })
  })

  it('that waits is taken up by the fit of the next batch, with its batch', async () => {
    const failed = await sendPairMeasures(pair, { from: 2010, count: 3, seed: 1 })
    const next = await sendPairMeasures(pair, { from: 1974.2, count: 14, seed: 12 })
    expect(next).toMatchObject({ state: 'done', newMeasures: 17 })
    expect(next.batches.map(batch => batch.number)).toEqual([1, 2])
    expect(await readFit(pair.coordinator.ctx, failed.id)).toMatchObject({ state: 'superseded', mayRule: false })
    await rule(pair.coordinator.ctx, next, 'accept', REASON)
    expect((await auditOf(house, 'batch.accepted')).map(event => event.detail.number)).toEqual([1, 2])
  })
})

describe('a ruling is refused, with nothing written,', () => {
  const attempt = async (ruling: { seenVersion?: number; decision?: Decision; by?: PairHouse['coordinator'] }) => {
    const fit = await latestFit(pair.coordinator.ctx, pair.target.id)
    return await ruleOnFit((ruling.by ?? pair.coordinator).ctx, { fitId: fit.id, decision: ruling.decision ?? 'accept', reason: REASON, seenVersion: ruling.seenVersion ?? fit.version })
  }

  it('to visitors, members, observers, administrators and coordinators of other programmes, as if there were nothing', async () => {
    const fit = await sendTwenty()
    const administrator = await addPerson(house, { displayName: 'Ada Boxwood', isAdministrator: true })
    const elsewhere = await addPerson(house, { displayName: 'R. Quellmann', coordinatorOf: [] })
    const before = await countRows(house)
    for (const ctx of [house.ctx, pair.member.ctx, pair.observer.ctx, administrator.ctx, elsewhere.ctx]) {
      await expect(rule(ctx, fit, 'accept', REASON)).rejects.toMatchObject({ code: 'not-found' })
    }
    expect(await countRows(house)).toEqual(before)
  })

  it('where the fit changed since it was seen', async () => {
    const fit = await sendTwenty()
    await requestFit(pair.coordinator.ctx, pair.target.id, { baseFitId: fit.id, setAside: [{ measureId: fit.measures[3]!.id, reason: 'Clouds.' }] })
    const before = await countRows(house)
    await expect(rule(pair.coordinator.ctx, fit, 'accept', REASON)).rejects.toMatchObject({ code: 'changed-meanwhile' })
    expect(await countRows(house)).toEqual(before)
  })

  it('before it is finished, and a second time', async () => {
    const { text } = { text: 'epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n' }
    await sendBatch(pair.observer.ctx, (await uploadText(pair.observer.ctx, { text, targetId: pair.target.id })).id)
    await expect(attempt({})).rejects.toMatchObject({ code: 'wrong-state' })
    await sendTwenty()
    await attempt({})
    const before = await countRows(house)
    await expect(attempt({ decision: 'decline' })).rejects.toMatchObject({ code: 'wrong-state' })
    expect(await countRows(house)).toEqual(before)
  })

  it('on own work while another coordinator can rule, whether one sent it or is credited in it', async () => {
    const both = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true, coordinatorOf: [pair.programmeId] })
    const own = await sendPairMeasures({ ...pair, observer: both }, { from: 1974.2, count: 20, seed: 12 })
    await expect(rule(both.ctx, own, 'accept', REASON)).rejects.toMatchObject({ code: 'own-work' })
    expect(await readFit(both.ctx, own.id)).toMatchObject({ mayRule: false, ruleHindrance: expect.stringMatching(/your own/) as string })
    await rule(pair.coordinator.ctx, own, 'accept', REASON)
    const credited = await sendPairMeasures(pair, { from: 2024.6, count: 2, seed: 5, stepYr: 0.4, observer: 'T. Orrowin' })
    await expect(rule(both.ctx, credited, 'accept', REASON)).rejects.toMatchObject({ code: 'own-work' })
    expect(await readFit(pair.coordinator.ctx, credited.id)).toMatchObject({ state: 'done', rulings: [] })
  })
})

describe('own work', () => {
  it('may be ruled on by the only coordinator there is', async () => {
    const only = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true, coordinatorOf: [pair.programmeId] })
    await house.database.db.updateTable('person').set({ state: 'closed' }).where('id', '=', pair.coordinator.id).execute()
    const fit = await sendPairMeasures({ ...pair, coordinator: only, observer: only }, { from: 1974.2, count: 20, seed: 12 })
    expect(await rule(only.ctx, fit, 'accept', REASON)).toMatchObject({ state: 'accepted' })
  })

  it('is not a refit that one only asked for', async () => {
    const fit = await rule(pair.coordinator.ctx, await sendTwenty(), 'accept', REASON)
    const asked = await requestFit(pair.coordinator.ctx, pair.target.id, { baseFitId: fit.id, setAside: [{ measureId: fit.measures[3]!.id, reason: 'Clouds.' }] })
    await runJobs(house.ctx)
    const refit = await readFit(pair.coordinator.ctx, asked.fit.id)
    expect(refit).toMatchObject({ newMeasures: 0, requestedBy: 'Mirelle Tasque', mayRule: true })
    expect(await rule(pair.coordinator.ctx, refit, 'accept', REASON)).toMatchObject({ state: 'accepted' })
  })
})
