import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { listEditions } from '../../../server/services/editions/list-editions'
import { readEdition } from '../../../server/services/editions/read-edition'
import { withdrawEdition } from '../../../server/services/editions/withdraw-edition'
import { addPerson } from '../../builders/people'
import { acceptedPairFit, addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { publish, rule } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
  await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
})
afterEach(() => house.close())

const withdrawal = (seenVersion = 1, number = 1) => ({ targetId: pair.target.id, number, reason: 'The clock was an hour off.', seenVersion })

describe('withdrawing an edition', () => {
  it('marks it with the reason, keeps it at its address and takes it from the list', async () => {
    const before = await readEdition(house.ctx, pair.target.id, 1)
    house.clock.advance(86_400_000)
    const after = await withdrawEdition(pair.coordinator.ctx, withdrawal())
    expect(after).toMatchObject({ state: 'withdrawn', withdrawal: { at: house.clock.now(), reason: 'The clock was an hour off.' }, mayWithdraw: false, version: 2 })
    expect(after.snapshot).toEqual(before.snapshot)
    expect(after.sha256).toBe(before.sha256)
    expect((await listEditions(house.ctx, {})).items).toEqual([])
    const audit = await house.database.reads.selectFrom('audit_event').selectAll().where('event', '=', 'edition.withdrawn').execute()
    expect(audit).toMatchObject([{ actor_id: pair.coordinator.id, target_id: pair.target.id }])
  })

  it('leaves room for the next edition, under the next number', async () => {
    await withdrawEdition(pair.coordinator.ctx, withdrawal())
    const fit = await sendPairMeasures(pair, { from: 2024.4, count: 5, seed: 5, stepYr: 0.4 })
    expect(await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, fit, 'accept', 'sound'))).toMatchObject({ number: 2, state: 'published' })
    expect(await readEdition(house.ctx, pair.target.id, 1)).toMatchObject({ state: 'withdrawn' })
  })

  it('is refused to others as if there were nothing, to a version not seen, and to an edition that is no longer in force', async () => {
    const administrator = await addPerson(house, { displayName: 'Elowen Karst', isAdministrator: true })
    for (const ctx of [house.ctx, pair.member.ctx, pair.observer.ctx, administrator.ctx]) {
      await expect(withdrawEdition(ctx, withdrawal())).rejects.toMatchObject({ code: 'not-found' })
    }
    await expect(withdrawEdition(pair.coordinator.ctx, withdrawal(7))).rejects.toMatchObject({ code: 'changed-meanwhile' })
    await expect(withdrawEdition(pair.coordinator.ctx, withdrawal(1, 2))).rejects.toMatchObject({ code: 'not-found' })
    expect(await readEdition(house.ctx, pair.target.id, 1)).toMatchObject({ state: 'published', version: 1 })
    const fit = await sendPairMeasures(pair, { from: 2024.4, count: 5, seed: 5, stepYr: 0.4 })
    await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, fit, 'accept', 'sound'))
    await expect(withdrawEdition(pair.coordinator.ctx, withdrawal(2))).rejects.toMatchObject({ code: 'wrong-state' })
  })
})
