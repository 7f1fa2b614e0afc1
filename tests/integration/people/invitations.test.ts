import { afterEach, beforeEach, expect, test } from 'vitest'
import { acceptInvitation } from '../../../server/services/people/accept-invitation'
import { invitePerson } from '../../../server/services/people/invite-person'
import { listInvitations } from '../../../server/services/people/list-invitations'
import { makeFirstAdministratorLink } from '../../../server/services/people/make-first-administrator-link'
import { readInvitation } from '../../../server/services/people/read-invitation'
import { addFirstAdministrator, addPerson, addProgramme } from '../../builders/people'
import type { AddedPerson } from '../../builders/people'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
let keeper: AddedPerson
beforeEach(async () => {
  house = await createTestHouse()
  keeper = await addFirstAdministrator(house, { displayName: 'Ilka Soundraven' })
})
afterEach(async () => { await house.close() })

const tokenOf = (url: string) => url.split('/').at(-1)!
const account = { email: 'new@example.org', displayName: 'Mirelle Tasque', password: 'a long enough password' }
const countPeople = async () => (await house.ctx.reads.selectFrom('person').select('id').execute()).length
const auditOf = (event: string) => house.ctx.reads.selectFrom('audit_event').selectAll().where('event', '=', event).orderBy('seq').execute()

test('an invitation creates one account with its roles and an observer of that name', async () => {
  const programme = await addProgramme(house, { name: 'Wide pairs' })
  const { url, id } = await invitePerson(keeper.ctx, { isObserver: true, isAdministrator: false, coordinatorOf: programme.id })
  const { me } = await acceptInvitation(house.ctx, tokenOf(url), account)
  expect(me).toMatchObject({ email: 'new@example.org', isObserver: true, isAdministrator: false, coordinatorOf: [programme.id] })
  const observer = await house.ctx.reads.selectFrom('observer').selectAll().where('person_id', '=', me.personId).executeTakeFirstOrThrow()
  expect(observer.name).toBe('Mirelle Tasque')
  const [joined] = (await auditOf('person.joined')).slice(-1)
  expect(joined).toMatchObject({ actor_id: me.personId, actor_kind: 'person', subject_id: me.personId })
  expect(JSON.parse(joined!.detail)).toEqual({ invitationId: id })
})

test('an invitation works once', async () => {
  const { url } = await invitePerson(keeper.ctx, { isObserver: true, isAdministrator: false })
  await acceptInvitation(house.ctx, tokenOf(url), account)
  const before = await countPeople()
  await expect(acceptInvitation(house.ctx, tokenOf(url), { ...account, email: 'second@example.org' })).rejects.toMatchObject({ code: 'invitation-unusable' })
  await expect(readInvitation(house.ctx, tokenOf(url))).rejects.toMatchObject({ code: 'invitation-unusable' })
  expect(await countPeople()).toBe(before)
})

test('two people who use one link at the same moment make one account', async () => {
  const { url } = await invitePerson(keeper.ctx, { isObserver: true, isAdministrator: false })
  const before = await countPeople()
  const outcomes = await Promise.allSettled(['a', 'b'].map(name => acceptInvitation(house.ctx, tokenOf(url), { ...account, email: `${name}@example.org` })))
  expect(outcomes.map(outcome => outcome.status).sort()).toEqual(['fulfilled', 'rejected'])
  expect(await countPeople()).toBe(before + 1)
})

test('an invitation can be used for fourteen days', async () => {
  const { url } = await invitePerson(keeper.ctx, { isObserver: true, isAdministrator: false })
  house.clock.advance(14 * 24 * 3600 * 1000)
  await expect(acceptInvitation(house.ctx, tokenOf(url), account)).rejects.toMatchObject({ code: 'invitation-unusable' })
})

test('an invitation for one address refuses another', async () => {
  const { url } = await invitePerson(keeper.ctx, { email: 'named@example.org', isObserver: true, isAdministrator: false })
  await expect(acceptInvitation(house.ctx, tokenOf(url), account)).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'email' }] })
  await acceptInvitation(house.ctx, tokenOf(url), { ...account, email: 'named@example.org' })
})

test('an address that has an account is neither invited nor taken a second time', async () => {
  await expect(invitePerson(keeper.ctx, { email: keeper.email, isObserver: true, isAdministrator: false })).rejects.toMatchObject({ code: 'email-taken' })
  const { url } = await invitePerson(keeper.ctx, { isObserver: true, isAdministrator: false })
  await expect(acceptInvitation(house.ctx, tokenOf(url), { ...account, email: keeper.email })).rejects.toMatchObject({ code: 'email-taken' })
  expect((await readInvitation(house.ctx, tokenOf(url))).usedAt).toBeNull()
})

test('a newcomer does not take over the observer of the same name', async () => {
  await house.ctx.db.insertInto('observer').values({ id: house.ctx.ids.newId(), name: 'Mirelle Tasque', name_key: 'mirelle tasque', person_id: null, created_at: house.clock.now() }).execute()
  const { url } = await invitePerson(keeper.ctx, { isObserver: true, isAdministrator: false })
  const { me } = await acceptInvitation(house.ctx, tokenOf(url), account)
  expect(await house.ctx.reads.selectFrom('observer').selectAll().where('person_id', '=', me.personId).execute()).toEqual([])
})

test('observers, coordinators and visitors invite nobody, and nothing is written', async () => {
  const programme = await addProgramme(house, { name: 'Wide pairs' })
  const observer = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true })
  const coordinator = await addPerson(house, { displayName: 'R. Quellmann', coordinatorOf: [programme.id] })
  const before = (await auditOf('person.invited')).length
  for (const ctx of [house.ctx, observer.ctx, coordinator.ctx]) {
    await expect(invitePerson(ctx, { isObserver: true, isAdministrator: true })).rejects.toMatchObject({ code: 'not-found' })
    await expect(listInvitations(ctx, {})).rejects.toMatchObject({ code: 'not-found' })
  }
  expect(await auditOf('person.invited')).toHaveLength(before)
})

test('the link is kept as a hash only', async () => {
  const { url } = await invitePerson(keeper.ctx, { isObserver: true, isAdministrator: false })
  const rows = await house.ctx.reads.selectFrom('invitation').selectAll().execute()
  expect(JSON.stringify(rows)).not.toContain(tokenOf(url))
  expect((await listInvitations(keeper.ctx, {})).items[0]).not.toHaveProperty('url')
})

test('an empty house gives a link for the first administrator, a new one at each start, and none once somebody is there', async () => {
  const empty = await createTestHouse({ seed: 'empty' })
  try {
    const first = await makeFirstAdministratorLink(empty.ctx)
    const second = await makeFirstAdministratorLink(empty.ctx)
    await expect(acceptInvitation(empty.ctx, tokenOf(first!), account)).rejects.toMatchObject({ code: 'invitation-unusable' })
    const { me } = await acceptInvitation(empty.ctx, tokenOf(second!), account)
    expect(me.isAdministrator).toBe(true)
    expect(await makeFirstAdministratorLink(empty.ctx)).toBeNull()
  }
  finally {
    await empty.close()
  }
})
