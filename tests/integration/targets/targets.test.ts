import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { createTarget } from '../../../server/services/targets/create-target'
import { followTarget, unfollowTarget } from '../../../server/services/targets/follow-target'
import { listTargets } from '../../../server/services/targets/list-targets'
import { readTarget } from '../../../server/services/targets/read-target'
import { createTargetSchema } from '../../../shared/schemas/targets'
import { addPerson, addProgramme } from '../../builders/people'
import { acceptedPairFit, addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { auditOf } from '../../builders/uploads'
import { addTarget, publish, rule } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => { await house.close() })

const countTargets = async () => (await house.ctx.reads.selectFrom('target').select('id').execute()).length

describe('making a target', () => {
  it('keeps its names and records it', async () => {
    const target = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'plane', name: 'Sun of 2026', aliases: ['Sun 26', 'SUN OF 2026'], radiusUnit: 'au', diameterScaleArcmin: 31.99, caution: 'sun' })
    expect(target).toMatchObject({ name: 'Sun of 2026', aliases: ['Sun 26'], kind: 'plane', caution: 'sun', radiusUnit: 'au', diameterScaleArcmin: 31.99, mayCoordinate: true, mayUpload: false, fit: null, fits: [], measures: [] })
    expect(await auditOf(house, 'target.created')).toMatchObject([{}, { subject_id: target.id, actor_id: pair.coordinator.id, detail: { name: 'Sun of 2026', kind: 'plane' } }])
  })

  it.each(['linden  12 ab', 'lnd 12'])('is refused where a name already means another target: %s', async (name) => {
    await expect(addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name })).rejects.toMatchObject({ code: 'name-taken', fields: [{ path: 'name' }] })
    await expect(addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 8', aliases: [name] })).rejects.toMatchObject({ code: 'name-taken', fields: [{ path: 'aliases' }] })
    expect(await countTargets()).toBe(1)
  })

  it('is for coordinators of its programme alone', async () => {
    const southern = await addProgramme(house, { name: 'Southern pairs' })
    const administrator = await addPerson(house, { displayName: 'Ada Boxwood', isAdministrator: true })
    const wish = (programmeId: string) => createTargetSchema.parse({ programmeId, kind: 'relative', name: 'Linden 8' })
    for (const ctx of [house.ctx, pair.member.ctx, pair.observer.ctx, administrator.ctx]) {
      await expect(createTarget(ctx, wish(pair.programmeId))).rejects.toMatchObject({ code: 'not-found' })
    }
    for (const programmeId of [southern.id, 'a'.repeat(26)]) await expect(createTarget(pair.coordinator.ctx, wish(programmeId))).rejects.toMatchObject({ code: 'not-found' })
    expect(await countTargets()).toBe(1)
  })
})

describe('the list of targets', () => {
  it('tells of measures, observers, the latest fit and the edition in force', async () => {
    await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    const epochs = (await readTarget(pair.member.ctx, pair.target.id, null)).measures.map(measure => measure.epochYr!)
    expect((await listTargets(pair.member.ctx, {})).items).toMatchObject([{
      name: 'Linden 12 AB', programme: { name: 'Northern pairs' }, measures: 20, observers: 1, firstEpochYr: Math.min(...epochs), lastEpochYr: Math.max(...epochs),
      latestFit: { number: 1, state: 'published' }, currentEdition: { number: 1 },
    }])
  })

  it('finds targets by part of any name, by kind and by programme, page by page', async () => {
    const southern = await addProgramme(house, { name: 'Southern pairs' })
    const both = await addPerson(house, { displayName: 'R. Quellmann', coordinatorOf: [pair.programmeId, southern.id] })
    for (const [name, kind, programmeId] of [['Linden 7 AB', 'relative', pair.programmeId], ['Sun of 2026', 'plane', pair.programmeId], ['Alder 3', 'relative', southern.id]] as const) {
      await addTarget(both.ctx, { programmeId, kind, name })
    }
    const names = async (listing: Parameters<typeof listTargets>[1]) => (await listTargets(pair.member.ctx, listing)).items.map(target => target.name)
    expect(await names({})).toEqual(['Alder 3', 'Linden 12 AB', 'Linden 7 AB', 'Sun of 2026'])
    expect(await names({ q: 'LND' })).toEqual(['Linden 12 AB'])
    expect(await names({ q: 'linden' })).toEqual(['Linden 12 AB', 'Linden 7 AB'])
    expect(await names({ q: '%' })).toEqual([])
    expect(await names({ kind: 'plane' })).toEqual(['Sun of 2026'])
    expect(await names({ programmeId: southern.id })).toEqual(['Alder 3'])
    const first = await listTargets(pair.member.ctx, { limit: 3 })
    expect(first.items).toHaveLength(3)
    expect(await listTargets(pair.member.ctx, { limit: 3, cursor: first.nextCursor! })).toMatchObject({ items: [{ name: 'Sun of 2026' }], nextCursor: null })
    await expect(listTargets(pair.member.ctx, { cursor: 'none of ours' })).rejects.toMatchObject({ code: 'input-invalid' })
  })

  it('and the sheets are for people who are signed in', async () => {
    await expect(listTargets(house.ctx, {})).rejects.toMatchObject({ code: 'sign-in-required' })
    await expect(readTarget(house.ctx, pair.target.id, null)).rejects.toMatchObject({ code: 'not-found' })
  })
})

describe('the sheet of a target', () => {
  it('shows the accepted fit after a later one was declined, and the declined one to who asks for it', async () => {
    const accepted = await acceptedPairFit(pair)
    const declined = await rule(pair.coordinator.ctx, await sendPairMeasures(pair, { from: 2024.6, count: 3, seed: 5, stepYr: 0.4 }), 'decline', 'A different pair.')
    const sheet = await readTarget(pair.member.ctx, pair.target.id, null)
    expect(sheet.fit!.id).toBe(accepted.id)
    expect(sheet.fits.map(fit => fit.state)).toEqual(['declined', 'accepted'])
    expect((await readTarget(pair.member.ctx, pair.target.id, declined.id)).fit!.id).toBe(declined.id)
  })

  it('shows the fit asked for, and none of another target', async () => {
    const fit = await acceptedPairFit(pair)
    expect((await readTarget(pair.member.ctx, pair.target.id, null)).fit!.id).toBe(fit.id)
    const other = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 7 AB' })
    await expect(readTarget(pair.member.ctx, other.id, fit.id)).rejects.toMatchObject({ code: 'not-found' })
  })
})

describe('following a target', () => {
  it('begins and ends once, however often it is asked for, and is recorded', async () => {
    for (let k = 0; k < 2; k++) await followTarget(pair.member.ctx, pair.target.id)
    expect((await readTarget(pair.member.ctx, pair.target.id, null)).isFollowed).toBe(true)
    expect((await readTarget(pair.observer.ctx, pair.target.id, null)).isFollowed).toBe(false)
    for (let k = 0; k < 2; k++) await unfollowTarget(pair.member.ctx, pair.target.id)
    expect((await readTarget(pair.member.ctx, pair.target.id, null)).isFollowed).toBe(false)
    expect((await auditOf(house, 'follow.started', 'follow.stopped')).map(event => event.event)).toEqual(['follow.started', 'follow.stopped'])
  })

  it('is for signed-in people and targets that are there', async () => {
    await expect(followTarget(house.ctx, pair.target.id)).rejects.toMatchObject({ code: 'not-found' })
    await expect(followTarget(pair.member.ctx, 'a'.repeat(26))).rejects.toMatchObject({ code: 'not-found' })
    await expect(unfollowTarget(house.ctx, pair.target.id)).rejects.toMatchObject({ code: 'not-found' })
  })
})
