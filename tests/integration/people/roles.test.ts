import { afterEach, beforeEach, expect, test } from 'vitest'
import { changeRoles } from '../../../server/services/people/change-roles'
import { listAuditEvents } from '../../../server/services/people/list-audit-events'
import { listPeople } from '../../../server/services/people/list-people'
import { createProgramme } from '../../../server/services/programmes/create-programme'
import { listProgrammes } from '../../../server/services/programmes/list-programmes'
import { createProgrammeSchema } from '../../../shared/schemas/targets'
import { addFirstAdministrator, addPerson, addProgramme } from '../../builders/people'
import type { AddedPerson } from '../../builders/people'
import { addTarget } from '../../builders/work'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
let keeper: AddedPerson
let observer: AddedPerson
beforeEach(async () => {
  house = await createTestHouse()
  keeper = await addFirstAdministrator(house, { displayName: 'Ilka Soundraven' })
  observer = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true })
})
afterEach(async () => { await house.close() })

const none = { isObserver: false, isAdministrator: false, coordinatorOf: [] as string[] }

test('an administrator sets all roles of a person, and the change is recorded', async () => {
  const [pairs, sun] = [await addProgramme(house, { name: 'Wide pairs' }), await addProgramme(house, { name: 'Sun' })]
  await changeRoles(keeper.ctx, observer.id, { ...none, coordinatorOf: [pairs.id, sun.id] })
  const changed = await changeRoles(keeper.ctx, observer.id, { ...none, isObserver: true, coordinatorOf: [sun.id] })
  expect(changed).toMatchObject({ isObserver: true, isAdministrator: false, coordinatorOf: [sun.id] })
  expect((await house.actAs(observer)).actor).toMatchObject({ isObserver: true, coordinatorOf: [sun.id] })
  const [newest] = (await listAuditEvents(keeper.ctx, {})).items
  expect(newest).toMatchObject({ event: 'roles.changed', actorName: 'Ilka Soundraven', subjectId: observer.id, subjectName: 'T. Orrowin', detail: { isObserver: true, isAdministrator: false, coordinatorOf: [sun.id] } })
})

test('the record names the target, person or programme that an event is about', async () => {
  const pairs = await addProgramme(house, { name: 'Wide pairs' })
  const coordinator = await addPerson(house, { displayName: 'Mirelle Tasque', coordinatorOf: [pairs.id] })
  await addTarget(coordinator.ctx, { kind: 'relative', programmeId: pairs.id, name: 'Linden 12 AB' })
  const { items } = await listAuditEvents(keeper.ctx, {})
  const nameOf = (event: string) => items.find(item => item.event === event)?.subjectName
  expect([nameOf('target.created'), nameOf('roles.changed'), nameOf('programme.created')]).toEqual(['Linden 12 AB', 'Mirelle Tasque', 'Wide pairs'])
})

test('nobody else sets roles, not even their own, and nothing is written', async () => {
  for (const ctx of [house.ctx, observer.ctx]) {
    await expect(changeRoles(ctx, observer.id, { ...none, isAdministrator: true })).rejects.toMatchObject({ code: 'not-found' })
  }
  expect((await house.actAs(observer)).actor?.isAdministrator).toBe(false)
})

test('the last administrator stays one until there is another', async () => {
  await expect(changeRoles(keeper.ctx, keeper.id, none)).rejects.toMatchObject({ code: 'wrong-state' })
  await changeRoles(keeper.ctx, observer.id, { ...none, isAdministrator: true })
  await changeRoles(keeper.ctx, keeper.id, none)
  expect((await house.actAs(keeper)).actor?.isAdministrator).toBe(false)
})

test('an unknown programme or person is refused and nothing is written', async () => {
  await expect(changeRoles(keeper.ctx, observer.id, { ...none, coordinatorOf: ['a'.repeat(26)] })).rejects.toMatchObject({ code: 'input-invalid' })
  await expect(changeRoles(keeper.ctx, 'a'.repeat(26), none)).rejects.toMatchObject({ code: 'not-found' })
  expect((await house.actAs(observer)).actor?.isObserver).toBe(true)
})

test('the list of people comes by name in pages, to administrators only', async () => {
  await addPerson(house, { displayName: 'R. Quellmann' })
  const first = await listPeople(keeper.ctx, { limit: 2 })
  const second = await listPeople(keeper.ctx, { limit: 2, cursor: first.nextCursor! })
  expect([...first.items, ...second.items].map(person => person.displayName)).toEqual(['Ilka Soundraven', 'R. Quellmann', 'T. Orrowin'])
  expect(second.nextCursor).toBeNull()
  for (const ctx of [house.ctx, observer.ctx]) {
    await expect(listPeople(ctx, {})).rejects.toMatchObject({ code: 'not-found' })
    await expect(listAuditEvents(ctx, {})).rejects.toMatchObject({ code: 'not-found' })
  }
})

test('a cursor of another list is refused with its reason', async () => {
  const { nextCursor } = await listPeople(keeper.ctx, { limit: 1 })
  await expect(listAuditEvents(keeper.ctx, { cursor: nextCursor! })).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'cursor' }] })
})

test('programmes are made by administrators, have one name each, and are listed to everybody with their coordinators', async () => {
  const pairs = await createProgramme(keeper.ctx, createProgrammeSchema.parse({ name: 'Wide pairs', leastMeasures: 12 }))
  await changeRoles(keeper.ctx, observer.id, { ...none, coordinatorOf: [pairs.id] })
  await expect(createProgramme(keeper.ctx, createProgrammeSchema.parse({ name: 'Wide pairs' }))).rejects.toMatchObject({ code: 'name-taken' })
  await expect(createProgramme(observer.ctx, createProgrammeSchema.parse({ name: 'Mine' }))).rejects.toMatchObject({ code: 'not-found' })
  expect((await listProgrammes(house.ctx, {})).items).toEqual([
    { ...pairs, leastMeasures: 12, coordinators: [{ id: observer.id, displayName: 'T. Orrowin' }] },
  ])
  expect((await listAuditEvents(keeper.ctx, {})).items.filter(({ event }) => event === 'programme.created')).toHaveLength(1)
})
