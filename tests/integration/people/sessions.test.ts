import { afterEach, beforeEach, expect, test } from 'vitest'
import { mountServer } from '../../builders/mounted-server'
import type { Client, MountedServer } from '../../builders/mounted-server'
import { addPerson } from '../../builders/people'
import type { AddedPerson } from '../../builders/people'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
let server: MountedServer
let person: AddedPerson
beforeEach(async () => {
  house = await createTestHouse()
  server = await mountServer(house)
  person = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true })
})
afterEach(async () => {
  await server.close()
  await house.close()
})

async function signedIn(password = person.password): Promise<Client> {
  const client = server.client()
  const answer = await client.call('POST', '/api/v1/session', { json: { email: person.email, password } })
  expect(answer.status).toBe(200)
  return client
}
const me = async (client: Client) => (await client.call('GET', '/api/v1/me')).json.me

test('signing in answers who one is, is remembered, and is recorded', async () => {
  const client = server.client()
  const answer = await client.call('POST', '/api/v1/session', { json: { email: person.email.toUpperCase(), password: person.password } })
  expect(answer.json.me).toMatchObject({ personId: person.id, displayName: 'T. Orrowin', isObserver: true, isAdministrator: false })
  expect(await me(client)).toMatchObject({ personId: person.id })
  const rows = await house.ctx.reads.selectFrom('audit_event').select(['actor_id', 'actor_kind']).where('event', '=', 'person.signed-in').where('actor_id', '=', person.id).execute()
  expect(rows).toHaveLength(2) // one from accepting the invitation
})

test('a wrong password and an unknown address are refused alike', async () => {
  const client = server.client()
  const wrong = await client.call('POST', '/api/v1/session', { json: { email: person.email, password: 'not this one' } })
  const unknown = await client.call('POST', '/api/v1/session', { json: { email: 'nobody@example.org', password: 'not this one' } })
  expect(wrong.status).toBe(401)
  expect(wrong.json).toEqual(unknown.json)
  expect(wrong.json.code).toBe('sign-in-failed')
  expect(wrong.headers.get('content-type')).toBe('application/problem+json')
  expect(await me(client)).toBeNull()
})

test('after eight failed attempts even the right password has to wait, and then works', async () => {
  const client = server.client()
  for (let attempt = 0; attempt < 8; attempt++) {
    await client.call('POST', '/api/v1/session', { json: { email: person.email, password: 'not this one' } })
  }
  const right = { json: { email: person.email, password: person.password } }
  expect((await client.call('POST', '/api/v1/session', right)).json.code).toBe('too-many-attempts')
  house.clock.advance(15 * 60 * 1000)
  expect((await client.call('POST', '/api/v1/session', right)).status).toBe(200)
})

test('signing out ends the session itself: its cookie is refused on the very next call', async () => {
  const client = await signedIn()
  const copy = client.copy()
  expect(await me(copy)).not.toBeNull()
  expect((await client.call('DELETE', '/api/v1/session')).status).toBe(204)
  expect(await me(client)).toBeNull()
  expect((await copy.call('PATCH', '/api/v1/me', { json: { displayName: 'X' } })).status).toBe(401)
})

test('a revoked session is refused on the very next call, though the cookie is still held', async () => {
  const client = await signedIn()
  expect((await client.call('PATCH', '/api/v1/me', { json: { displayName: 'Tova Orrowin' } })).status).toBe(200)
  await house.ctx.db.updateTable('session').set({ revoked_at: house.clock.now() }).where('person_id', '=', person.id).execute()
  expect((await client.call('PATCH', '/api/v1/me', { json: { displayName: 'Somebody else' } })).status).toBe(401)
  expect(await me(client)).toBeNull()
})

test('signing out everywhere ends every session of that person and of nobody else', async () => {
  const other = await addPerson(house, { displayName: 'R. Quellmann' })
  const otherClient = server.client()
  await otherClient.call('POST', '/api/v1/session', { json: { email: other.email, password: other.password } })
  const [first, second] = [await signedIn(), await signedIn()]
  expect((await first.call('DELETE', '/api/v1/sessions')).status).toBe(204)
  expect(await me(first)).toBeNull()
  expect(await me(second)).toBeNull()
  expect(await me(otherClient)).toMatchObject({ personId: other.id })
})

test('a session ends thirty days after it began, and after fourteen days without use', async () => {
  const day = 24 * 3600 * 1000
  const used = await signedIn()
  const idle = await signedIn()
  house.clock.advance(13 * day)
  expect(await me(used)).not.toBeNull()
  house.clock.advance(2 * day)
  expect(await me(used)).not.toBeNull()
  expect(await me(idle)).toBeNull()
  house.clock.advance(12 * day)
  expect(await me(used)).not.toBeNull()
  house.clock.advance(4 * day)
  expect(await me(used)).toBeNull()
})

test('a closed account cannot sign in and its sessions are over', async () => {
  const client = await signedIn()
  await house.ctx.db.updateTable('person').set({ state: 'closed' }).where('id', '=', person.id).execute()
  expect(await me(client)).toBeNull()
  expect((await client.call('POST', '/api/v1/session', { json: { email: person.email, password: person.password } })).status).toBe(401)
})

test('changing the password needs the present one, ends the other sessions and is recorded', async () => {
  const [here, elsewhere] = [await signedIn(), await signedIn()]
  const refused = await here.call('POST', '/api/v1/me/password', { json: { currentPassword: 'a guess', newPassword: 'another long password' } })
  expect(refused.status).toBe(422)
  expect(refused.json.fields).toEqual([{ path: 'currentPassword', reason: 'is not your present password' }])
  expect(await me(elsewhere)).not.toBeNull()
  const changed = await here.call('POST', '/api/v1/me/password', { json: { currentPassword: person.password, newPassword: 'another long password' } })
  expect(changed.status).toBe(204)
  expect(await me(here)).not.toBeNull()
  expect(await me(elsewhere)).toBeNull()
  await signedIn('another long password')
  const row = await house.ctx.reads.selectFrom('audit_event').select('detail').where('event', '=', 'password.changed').executeTakeFirstOrThrow()
  expect(JSON.parse(row.detail)).toEqual({ sessionsEnded: 2 }) // elsewhere, and the one of the invitation
})
