import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { followTarget, unfollowTarget } from '../../../server/services/targets/follow-target'
import { listTargets } from '../../../server/services/targets/list-targets'
import type { TargetView } from '../../../shared/schemas/targets'
import { addPerson, addProgramme } from '../../builders/people'
import type { AddedPerson } from '../../builders/people'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { addTarget } from '../../builders/work'

let house: TestHouse
let reader: AddedPerson
let targets: TargetView[]
beforeEach(async () => {
  house = await createTestHouse()
  const programme = await addProgramme(house, { name: 'Northern pairs' })
  const coordinator = await addPerson(house, { displayName: 'Mirelle Tasque', coordinatorOf: [programme.id] })
  reader = await addPerson(house, { displayName: 'Wenna Ashgrove' })
  targets = []
  for (const name of ['Linden 7 AB', 'Linden 12 AB']) targets.push(await addTarget(coordinator.ctx, { programmeId: programme.id, kind: 'relative', name }))
})
afterEach(() => house.close())

const followedBy = async (person: AddedPerson) => (await listTargets(person.ctx, { followed: '1' })).items.map(target => target.name)

describe('the targets that a person follows', () => {
  it('are listed alone, and only to the person who follows them', async () => {
    const other = await addPerson(house, { displayName: 'Ossian Brandvik' })
    await followTarget(reader.ctx, targets[0]!.id)
    expect(await followedBy(reader)).toEqual(['Linden 7 AB'])
    expect(await followedBy(other)).toEqual([])
    expect((await listTargets(reader.ctx, {})).items).toHaveLength(2)
  })

  it('leave the list when following ends', async () => {
    await followTarget(reader.ctx, targets[0]!.id)
    await followTarget(reader.ctx, targets[1]!.id)
    await unfollowTarget(reader.ctx, targets[0]!.id)
    expect(await followedBy(reader)).toEqual(['Linden 12 AB'])
  })

  it('are not listed to a visitor', async () => {
    await expect(listTargets(house.ctx, { followed: '1' })).rejects.toMatchObject({ code: 'sign-in-required' })
  })
})
