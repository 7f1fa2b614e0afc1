import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { listDesk } from '../../../server/services/desk/list-desk'
import { addPerson, addProgramme } from '../../builders/people'
import { addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { addTarget, rule } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => { await house.close() })

describe('the desk', () => {
  it('lists what waits in the programmes one coordinates, the longest waiting first, with what stands out', async () => {
    const done = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12, observer: 'T. Orrowin' })
    house.clock.advance(3_600_000)
    const other = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 7 AB' })
    const failed = await sendPairMeasures({ ...pair, target: other }, { from: 2010, count: 3, seed: 1 })
    const items = await listDesk(pair.coordinator.ctx)
    expect(items.map(item => item.fit.id)).toEqual([done.id, failed.id])
    expect(items[0]).toMatchObject({
      targetName: 'Linden 12 AB', kind: 'relative', programme: { id: pair.programmeId, name: 'Northern pairs' }, what: '20 new measures by T. Orrowin',
      waitingSince: done.finishedAt, thumbnailSvg: expect.stringMatching(/^<svg/) as string,
    })
    expect(items[1]).toMatchObject({ what: '3 new measures by Ossian Brandvik', thumbnailSvg: null })
    expect(items[1]!.notes[0]).toMatch(/7 unknowns/)
  })

  it('forgets what was ruled on', async () => {
    const fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
    await rule(pair.coordinator.ctx, fit, 'accept', 'Nothing stands out.')
    expect(await listDesk(pair.coordinator.ctx)).toEqual([])
  })

  it('is empty for the coordinator of another programme and not there for everybody else', async () => {
    await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
    const southern = await addProgramme(house, { name: 'Southern pairs' })
    const elsewhere = await addPerson(house, { displayName: 'R. Quellmann', coordinatorOf: [southern.id] })
    expect(await listDesk(elsewhere.ctx)).toEqual([])
    for (const ctx of [house.ctx, pair.member.ctx, pair.observer.ctx]) await expect(listDesk(ctx)).rejects.toMatchObject({ code: 'not-found' })
  })
})
