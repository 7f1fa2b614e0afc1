import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { fitOrbit, predict } from '../../../fitting'
import type { FitRequest } from '../../../fitting/types'
import { canonicalJson, sha256Hex } from '../../../server/domain/canonical-json'
import { downloadEdition } from '../../../server/services/editions/download-edition'
import { readEdition } from '../../../server/services/editions/read-edition'
import type { EditionSnapshot } from '../../../shared/schemas/editions'
import { addPerson, addProgramme } from '../../builders/people'
import { acceptedPairFit, addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { addTarget, publish, rule, setAside } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(() => house.close())

const editionRows = () => house.database.reads.selectFrom('edition').selectAll().orderBy('number').execute()
const audits = async (event: string) => (await house.database.reads.selectFrom('audit_event').selectAll().where('event', '=', event).orderBy('seq').execute())
const snapshotOf = async (number: number) => {
  const { text, sha256 } = await downloadEdition(house.ctx, { targetId: pair.target.id, number, name: 'snapshot.json' })
  return { text, sha256, snapshot: JSON.parse(text) as EditionSnapshot }
}

describe('publishing an accepted fit', () => {
  it('makes edition 1, marks the fit published and records who did it', async () => {
    const fit = await acceptedPairFit(pair)
    const edition = await publish(pair.coordinator.ctx, fit, 'The first orbit.')
    expect(edition).toMatchObject({ number: 1, state: 'published', targetName: 'Linden 12 AB', programmeName: 'Northern pairs', measures: 20, observers: 1 })
    expect(edition.summary).toMatch(/^P 6\d/)
    const [row] = await house.database.reads.selectFrom('fit').selectAll().where('id', '=', fit.id).execute()
    expect(row).toMatchObject({ state: 'published', version: fit.version + 1 })
    const [audit] = await audits('edition.published')
    expect(audit).toMatchObject({ actor_id: pair.coordinator.id, subject_kind: 'edition', target_id: pair.target.id })
    expect(JSON.parse(audit!.detail)).toEqual({ number: 1, fitId: fit.id, sha256: edition.sha256 })
  })

  it('seals canonical bytes whose hash is the one shown', async () => {
    const edition = await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    const { text, sha256, snapshot } = await snapshotOf(1)
    expect(sha256Hex(text)).toBe(sha256)
    expect(sha256).toBe(edition.sha256)
    expect(canonicalJson(snapshot)).toBe(text)
    expect(snapshot).toMatchObject({ format: 1, licence: 'CC-BY-4.0', observers: [{ name: 'Ossian Brandvik', measures: 20 }], target: { aliases: ['LND 12'], componentA: 'A' } })
    expect(snapshot.citation).toContain(`/orbits/${pair.target.id}/1`)
  })

  it('can be repeated to the last byte from the request in its snapshot', async () => {
    await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    const { snapshot } = await snapshotOf(1)
    const outcome = fitOrbit(snapshot.request as FitRequest)
    expect(outcome.ok).toBe(true)
    expect(canonicalJson(outcome.ok && outcome.result)).toBe(canonicalJson(snapshot.result))
    expect(canonicalJson(predict(snapshot.result, snapshot.predictions.map(prediction => prediction.at)))).toBe(canonicalJson(snapshot.predictions))
  })

  it('predicts ten years from the year of publication, each with its error', async () => {
    house.clock.set('2027-05-04T12:00:00.000Z')
    await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    const { predictions } = (await snapshotOf(1)).snapshot
    expect(predictions.map(prediction => prediction.at)).toEqual([2027, 2028, 2029, 2030, 2031, 2032, 2033, 2034, 2035, 2036])
    for (const { values, sigmas } of predictions) {
      expect(values.rhoArcsec).toBeGreaterThan(0)
      expect(sigmas.rhoArcsec).toBeGreaterThan(0)
      expect(sigmas.thetaDeg).toBeGreaterThan(0)
    }
  })

  it('keeps what was set aside, with the reason and who decided, out of the credit', async () => {
    const fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
    const refit = await setAside(pair.coordinator.ctx, fit, [{ measureId: fit.measures[0]!.id, reason: 'clouds came in' }])
    await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, refit, 'accept', 'sound'))
    const { snapshot } = await snapshotOf(1)
    expect(snapshot.observers).toEqual([{ name: 'Ossian Brandvik', measures: 19 }])
    expect(snapshot.measures.filter(measure => measure.role === 'set-aside')).toMatchObject([{ id: fit.measures[0]!.id, reason: 'clouds came in', decidedBy: 'Mirelle Tasque' }])
  })
})

describe('a second edition', () => {
  it('supersedes the first, which keeps its address, its bytes and its hash', async () => {
    await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    const before = await snapshotOf(1)
    const fit = await sendPairMeasures(pair, { from: 2024.4, count: 5, seed: 5, stepYr: 0.4 })
    const second = await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, fit, 'accept', 'fits well'), 'Five measures joined.')
    expect(second).toMatchObject({ number: 2, measures: 25 })
    expect(await snapshotOf(1)).toEqual(before)
    expect(await readEdition(house.ctx, pair.target.id, 1)).toMatchObject({ state: 'superseded', supersededBy: 2, mayWithdraw: false })
    expect(await readEdition(house.ctx, pair.target.id, 2)).toMatchObject({ state: 'published', supersededBy: null, whatChanged: 'Five measures joined.' })
    expect((await audits('edition.superseded')).map(row => JSON.parse(row.detail))).toEqual([{ number: 1, by: 2 }])
  })

  it('is refused for a fit older than the one in force', async () => {
    const first = await acceptedPairFit(pair)
    const second = await rule(pair.coordinator.ctx, await sendPairMeasures(pair, { from: 2024.4, count: 5, seed: 5, stepYr: 0.4 }), 'accept', 'fits well')
    await publish(pair.coordinator.ctx, second)
    await expect(publish(pair.coordinator.ctx, first)).rejects.toMatchObject({ code: 'wrong-state' })
    expect(await editionRows()).toHaveLength(1)
  })
})

describe('publishing is refused, and nothing is written', () => {
  const expectNothing = async () => {
    expect(await editionRows()).toEqual([])
    expect(await audits('edition.published')).toEqual([])
    expect(await house.database.reads.selectFrom('mail_out').selectAll().where('template', '=', 'edition-published').execute()).toEqual([])
  }

  it('for visitors, members, observers, administrators and coordinators of another programme, as if there were nothing', async () => {
    const fit = await acceptedPairFit(pair)
    const other = await addProgramme(house, { name: 'Southern pairs' })
    const stranger = await addPerson(house, { displayName: 'Sefa Marrowby', coordinatorOf: [other.id] })
    const administrator = await addPerson(house, { displayName: 'Elowen Karst', isAdministrator: true })
    for (const ctx of [house.ctx, pair.member.ctx, pair.observer.ctx, administrator.ctx, stranger.ctx]) {
      await expect(publish(ctx, fit)).rejects.toMatchObject({ code: 'not-found' })
    }
    await expectNothing()
  })

  it('for a fit that is not accepted yet', async () => {
    const fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
    await expect(publish(pair.coordinator.ctx, fit)).rejects.toMatchObject({ code: 'wrong-state' })
    await expectNothing()
  })

  it('for a fit that changed since it was seen', async () => {
    const fit = await acceptedPairFit(pair)
    await expect(publish(pair.coordinator.ctx, { id: fit.id, version: fit.version - 1 })).rejects.toMatchObject({ code: 'changed-meanwhile' })
    await expectNothing()
  })

  it('while the rules of the programme are not met, naming each', async () => {
    const strict = await addProgramme(house, { name: 'Strict pairs', leastMeasures: 30, leastObservers: 3 })
    const coordinator = await addPerson(house, { displayName: 'Halden Ruskwell', coordinatorOf: [strict.id] })
    const target = await addTarget(coordinator.ctx, { programmeId: strict.id, kind: 'relative', name: 'Linden 40 AB' })
    const fit = await acceptedPairFit({ ...pair, coordinator, target })
    await expect(publish(coordinator.ctx, fit)).rejects.toMatchObject({ code: 'rules-not-met', detail: expect.stringMatching(/30 measures.*3 observers/) })
    await expectNothing()
  })
})
