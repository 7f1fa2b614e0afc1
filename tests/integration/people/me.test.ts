import { afterEach, beforeEach, expect, test } from 'vitest'
import { meOf } from '../../../server/services/people/me-of'
import { renameMe } from '../../../server/services/people/rename-me'
import { addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { rule } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => { await house.close() })

test('a coordinator is told how many fits wait on her desk, others have none', async () => {
  const { coordinator, observer } = pair
  expect((await meOf(coordinator.ctx)).deskCount).toBe(0)
  const fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 3 })
  expect((await meOf(coordinator.ctx)).deskCount).toBe(1)
  expect((await meOf(observer.ctx)).deskCount).toBe(0)
  await rule(coordinator.ctx, fit, 'accept', 'Nothing stands out.')
  expect((await meOf(coordinator.ctx)).deskCount).toBe(0)
})

test('a new name is shown from then on, and the observer credited with measures keeps its own', async () => {
  const { observer } = pair
  await renameMe(observer.ctx, 'Ossian B.')
  expect((await meOf(observer.ctx)).displayName).toBe('Ossian B.')
  const credited = await house.ctx.reads.selectFrom('observer').select('name').where('person_id', '=', observer.id).executeTakeFirstOrThrow()
  expect(credited.name).toBe('Ossian Brandvik')
  expect(await house.ctx.reads.selectFrom('audit_event').select('actor_id').where('event', '=', 'person.renamed').execute()).toEqual([{ actor_id: observer.id }])
})

test('a visitor is nobody', async () => {
  await expect(meOf(house.ctx)).rejects.toMatchObject({ code: 'sign-in-required' })
  await expect(renameMe(house.ctx, 'X')).rejects.toMatchObject({ code: 'sign-in-required' })
})
