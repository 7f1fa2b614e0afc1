import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { mendRow } from '../../../server/services/batches/mend-row'
import { readBatch } from '../../../server/services/batches/read-batch'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { withdrawBatch } from '../../../server/services/batches/withdraw-batch'
import { readFit } from '../../../server/services/fits/read-fit'
import { readTarget } from '../../../server/services/targets/read-target'
import { addPerson } from '../../builders/people'
import { addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { auditOf, countRows, uploadText } from '../../builders/uploads'
import { addTarget, latestFit, rule } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => { await house.close() })

const FILE = 'epoch,theta_deg,rho_arcsec\n2020.1,40.0,1.20\n2021.1,42.5,1.18\n2022.1,x,1.1\n'
const upload = (text: string, targetId: string | null = pair.target.id) => uploadText(pair.observer.ctx, { text, targetId })
const others = async () => [house.ctx, pair.member.ctx, pair.coordinator.ctx, (await addPerson(house, { displayName: 'Ilka Soundraven', isObserver: true })).ctx]

describe('sending a batch', () => {
  it('makes measures of the good rows, keeps the rest as a draft, queues one fit and records both', async () => {
    const batch = await upload(FILE)
    const outcome = await sendBatch(pair.observer.ctx, batch.id)
    expect(outcome).toMatchObject({
      sent: 2, alreadyHere: 0, keptAsDraft: 1, sentence: '2 new measures sent. 1 row is kept as a draft.',
      fits: [{ targetId: pair.target.id, targetName: 'Linden 12 AB' }],
    })
    const after = await readBatch(pair.observer.ctx, batch.id)
    expect(after).toMatchObject({ good: 0, bad: 1, sent: 2, mayWithdraw: true, parts: [{ state: 'sent', measures: 2 }] })
    const target = await readTarget(pair.member.ctx, pair.target.id, null)
    expect(target.measures).toMatchObject([
      { observer: 'Ossian Brandvik', epochYr: 2020.1, thetaDeg: 40, rhoArcsec: 1.2, batchNumber: 1 },
      { observer: 'Ossian Brandvik', epochYr: 2021.1, thetaDeg: 42.5, rhoArcsec: 1.18, batchNumber: 1 },
    ])
    expect(target.fit).toMatchObject({ id: outcome.fits[0]!.fitId, number: 1, state: 'queued', cause: 'batch-sent', newMeasures: 2, batches: [{ number: 1, state: 'sent' }], job: { state: 'queued', attempts: 0 } })
    expect(await auditOf(house, 'batch.sent', 'fit.requested')).toMatchObject([
      { event: 'batch.sent', actor_id: pair.observer.id, detail: { number: 1, sent: 2, alreadyHere: 0, keptAsDraft: 1 } },
      { event: 'fit.requested', actor_id: pair.observer.id, detail: { number: 1, cause: 'batch-sent' } },
    ])
  })

  it('queues a fit for each target that it touches', async () => {
    await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 7 AB' })
    const batch = await upload('target,epoch,theta_deg,rho_arcsec\nLinden 7 AB,2020.1,40,1.2\nLinden 12 AB,2021.1,42,1.2\n', null)
    expect((await sendBatch(pair.observer.ctx, batch.id)).fits.map(fit => fit.targetName).sort()).toEqual(['Linden 12 AB', 'Linden 7 AB'])
    expect(await countRows(house)).toMatchObject({ fit: 2, job: 2, measure: 2 })
  })

  it('credits the observer a row names, once for every way of writing the name, and ties the own name to the account', async () => {
    const batch = await upload('observer,epoch,theta_deg,rho_arcsec\nT. Orrowin,2020.1,40,1.2\nt.  orrowin,2021.1,42,1.2\n,2022.1,43,1.2\n')
    await sendBatch(pair.observer.ctx, batch.id)
    const observers = await house.ctx.reads.selectFrom('observer').select(['name', 'person_id']).where('name', 'in', ['Ossian Brandvik', 'T. Orrowin', 't.  orrowin']).orderBy('name').execute()
    expect(observers).toEqual([{ name: 'Ossian Brandvik', person_id: pair.observer.id }, { name: 'T. Orrowin', person_id: null }])
  })

  it('does not credit a namesake with measures of an observer who was here before', async () => {
    const first = await upload('observer,epoch,theta_deg,rho_arcsec\nT. Orrowin,2020.1,40,1.2\n')
    await sendBatch(pair.observer.ctx, first.id)
    const namesake = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true })
    const second = await uploadText(namesake.ctx, { text: 'epoch,theta_deg,rho_arcsec\n2021.1,41,1.2\n', targetId: pair.target.id })
    await sendBatch(namesake.ctx, second.id)
    expect((await readTarget(pair.member.ctx, pair.target.id, null)).measures.map(measure => measure.observer)).toEqual(['T. Orrowin', 'T. Orrowin (2)'])
  })

  it('appends rows that were mended later and fits everything that waits anew', async () => {
    const batch = await upload(FILE)
    await sendBatch(pair.observer.ctx, batch.id)
    await mendRow(pair.observer.ctx, { batchId: batch.id, rowId: batch.items[2]!.id, cells: { theta_deg: '44' } })
    const outcome = await sendBatch(pair.observer.ctx, batch.id)
    expect(outcome).toMatchObject({ sent: 1, keptAsDraft: 0 })
    const { fits, fit } = await readTarget(pair.member.ctx, pair.target.id, null)
    expect(fits.map(({ number, state }) => ({ number, state }))).toEqual([{ number: 2, state: 'queued' }, { number: 1, state: 'superseded' }])
    expect(fit).toMatchObject({ newMeasures: 3, batches: [{ number: 1 }] })
    expect(await auditOf(house, 'fit.superseded')).toMatchObject([{ detail: { number: 1, by: fit!.id } }])
    const jobs = await house.ctx.reads.selectFrom('job').select(['name', 'state']).where('name', '=', 'run-fit').orderBy('created_at').orderBy('state').execute()
    expect(jobs.map(job => job.state).sort()).toEqual(['cancelled', 'queued'])
  })

  it('also appends to a part that was accepted meanwhile, and a ruling on the later rows leaves the accepted ones standing', async () => {
    const fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
    await rule(pair.coordinator.ctx, fit, 'accept', 'Nothing stands out.')
    const batchId = fit.batches[0]!.id
    await house.database.db.insertInto('batch_row').values({
      id: house.ctx.ids.newId(), batch_id: batchId, row_number: 40, state: 'bad', target_id: pair.target.id, mended_cells: null, parsed: null,
      original_cells: JSON.stringify({ epoch: '2025.3', theta_deg: 'x', rho_arcsec: '1.1' }), problems: JSON.stringify({ read: [], resolved: [] }),
    }).execute()
    const row = (await readBatch(pair.observer.ctx, batchId)).items.at(-1)!
    await mendRow(pair.observer.ctx, { batchId, rowId: row.id, cells: { theta_deg: '300' } })
    const { fits: [queued] } = await sendBatch(pair.observer.ctx, batchId)
    expect(await readFit(pair.coordinator.ctx, queued!.fitId)).toMatchObject({ newMeasures: 1, state: 'queued' })
    await withdrawBatch(pair.observer.ctx, { batchId, targetId: pair.target.id })
    expect((await readTarget(pair.member.ctx, pair.target.id, null)).measures).toHaveLength(20)
  })

  it('says that nothing is new, and writes nothing', async () => {
    const batch = await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n')
    await sendBatch(pair.observer.ctx, batch.id)
    const again = await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n')
    const before = await countRows(house)
    await expect(sendBatch(pair.observer.ctx, again.id)).rejects.toMatchObject({ code: 'nothing-to-send', detail: expect.stringMatching(/^0 new, 1 already here/) as string })
    await expect(sendBatch(pair.observer.ctx, batch.id)).rejects.toMatchObject({ code: 'nothing-to-send' })
    expect(await countRows(house)).toEqual(before)
  })

  it('takes one of two batches that bring the same measure, whichever is sent first', async () => {
    const [one, two] = [await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n'), await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n2021.1,41,1.2\n')]
    await sendBatch(pair.observer.ctx, one.id)
    expect(await sendBatch(pair.observer.ctx, two.id)).toMatchObject({ sent: 1, alreadyHere: 1 })
    expect(await countRows(house)).toMatchObject({ measure: 2 })
  })

  it('is for its owner alone', async () => {
    const batch = await upload(FILE)
    const people = await others()
    const before = await countRows(house)
    for (const ctx of people) await expect(sendBatch(ctx, batch.id)).rejects.toMatchObject({ code: 'not-found' })
    expect(await countRows(house)).toEqual(before)
  })
})

describe('withdrawing what was sent', () => {
  it('takes its measures out, supersedes the waiting fit and records it; the same measures can be sent again', async () => {
    const batch = await upload(FILE)
    await sendBatch(pair.observer.ctx, batch.id)
    const view = await withdrawBatch(pair.observer.ctx, { batchId: batch.id, targetId: pair.target.id })
    expect(view).toMatchObject({ mayWithdraw: false, parts: [{ state: 'withdrawn' }] })
    const target = await readTarget(pair.member.ctx, pair.target.id, null)
    expect(target.measures).toEqual([])
    expect(target.fits.map(fit => fit.state)).toEqual(['superseded'])
    expect(await auditOf(house, 'batch.withdrawn', 'fit.superseded')).toMatchObject([{ event: 'batch.withdrawn' }, { event: 'fit.superseded', detail: { by: null } }])
    expect((await upload(FILE)).good).toBe(2)
  })

  it('fits anew what others sent and still waits', async () => {
    const orrowin = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true })
    const mine = await upload(FILE)
    const theirs = await uploadText(orrowin.ctx, { text: 'epoch,theta_deg,rho_arcsec\n2019.1,38,1.2\n', targetId: pair.target.id })
    await sendBatch(pair.observer.ctx, mine.id)
    await sendBatch(orrowin.ctx, theirs.id)
    expect((await latestFit(pair.coordinator.ctx, pair.target.id)).batches.map(batch => batch.number)).toEqual([1, 2])
    await withdrawBatch(pair.observer.ctx, { batchId: mine.id, targetId: pair.target.id })
    const fit = await latestFit(pair.coordinator.ctx, pair.target.id)
    expect(fit).toMatchObject({ number: 3, state: 'queued', cause: 'requeued', newMeasures: 1 })
    expect(fit.batches.map(batch => batch.number)).toEqual([2])
  })

  it('is refused for a draft, after a ruling and to everybody but the owner', async () => {
    const draft = await upload(FILE)
    const withdraw = (batchId: string, ctx = pair.observer.ctx) => withdrawBatch(ctx, { batchId, targetId: pair.target.id })
    await expect(withdraw(draft.id)).rejects.toMatchObject({ code: 'wrong-state' })
    const fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
    for (const ctx of await others()) await expect(withdraw(fit.batches[0]!.id, ctx)).rejects.toMatchObject({ code: 'not-found' })
    await rule(pair.coordinator.ctx, fit, 'accept', 'Nothing stands out.')
    await expect(withdraw(fit.batches[0]!.id)).rejects.toMatchObject({ code: 'wrong-state' })
    expect(await auditOf(house, 'batch.withdrawn')).toEqual([])
  })
})
