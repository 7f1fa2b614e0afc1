import { request } from 'node:http'
import { connect } from 'node:net'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { openHouse } from '../../../server/http/house'
import { mountServer } from '../../builders/mounted-server'
import type { Client, MountedServer } from '../../builders/mounted-server'
import { addFirstAdministrator } from '../../builders/people'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
let server: MountedServer
let keeper: Client
beforeAll(async () => {
  house = await createTestHouse()
  server = await mountServer(house)
  const person = await addFirstAdministrator(house, { displayName: 'Ilka Soundraven' })
  keeper = server.client()
  await keeper.call('POST', '/api/v1/session', { json: { email: person.email, password: person.password } })
})
afterAll(async () => {
  await server.close()
  await house.close()
})

const PROGRAMMES = '/api/v1/programmes'
const countProgrammes = async () => (await house.ctx.reads.selectFrom('programme').select('id').execute()).length
const problemOf = (answer: { status: number, json: { code: string } }) => [answer.status, answer.json.code]

test('a problem is answered as RFC 9457 says, with a closed code and a sentence on what to do', async () => {
  const answer = await keeper.call('POST', PROGRAMMES, { json: { name: '', leastMeasures: 'many' } })
  expect(answer.headers.get('content-type')).toBe('application/problem+json')
  expect(answer.json).toMatchObject({ status: 422, code: 'input-invalid', title: expect.any(String), type: '/problems/input-invalid' })
  expect(answer.json.fields.map((field: { path: string }) => field.path)).toEqual(['name', 'leastMeasures'])
  expect(answer.json.detail).toMatch(/nothing was written/)
})

test('a field that is missing is said to be missing', async () => {
  const answer = await keeper.call('POST', PROGRAMMES, { json: {} })
  expect(answer.json.fields).toEqual([{ path: 'name', reason: 'is missing' }])
})

test('a JSON route takes no form, no text and no untyped body', async () => {
  const body = JSON.stringify({ name: 'By a form' })
  for (const type of ['application/x-www-form-urlencoded', 'text/plain', 'multipart/form-data; boundary=x', '']) {
    expect(problemOf(await keeper.call('POST', PROGRAMMES, { body: new TextEncoder().encode(body), headers: type ? { 'content-type': type } : {} }))).toEqual([415, 'body-not-json'])
  }
  expect(await countProgrammes()).toBe(0)
})

test.each([['{"name": '], ['not json'], [''], ['{"name": "\xff\xfe"}']])('a body that is no JSON in UTF-8 is refused: %j', async (text) => {
  const answer = await keeper.call('POST', PROGRAMMES, { body: Buffer.from(text, 'latin1'), headers: { 'content-type': 'application/json' } })
  expect(problemOf(answer)).toEqual([400, 'body-malformed'])
})

test('JSON of another shape is refused field by field, never with a failure of the server', async () => {
  for (const json of [null, [], 7, 'text', { name: { a: 1 } }, { name: ['x'] }]) {
    expect(problemOf(await keeper.call('POST', PROGRAMMES, { json }))).toEqual([422, 'input-invalid'])
  }
})

test('a body over the cap is refused by its length', async () => {
  const answer = await keeper.call('POST', PROGRAMMES, { json: { name: 'x'.repeat(1024 * 1024) } })
  expect(problemOf(answer)).toEqual([413, 'body-too-large'])
})

test('a body over the cap without a length is refused while it comes, and the server lives on', async () => {
  const status = await new Promise<number | undefined>((resolve, reject) => {
    const call = request(`${server.baseUrl}/api/v1/session`, { method: 'POST', headers: { 'content-type': 'application/json' } }, (response) => {
      response.resume()
      resolve(response.statusCode)
    })
    call.on('error', reject)
    const chunk = 'x'.repeat(64 * 1024)
    for (let count = 0; count < 20; count++) call.write(chunk)
    call.end()
  })
  expect(status).toBe(413)
  expect((await keeper.call('GET', '/healthz')).status).toBe(200)
})

test('a body that ends before its length is no body: nothing is written, and the server lives on', async () => {
  const { hostname, port } = new URL(server.baseUrl)
  await new Promise<void>((resolve) => {
    const socket = connect(Number(port), hostname, () => {
      socket.write(`POST ${PROGRAMMES} HTTP/1.1\r\nHost: ${hostname}\r\nContent-Type: application/json\r\nContent-Length: 1000\r\n\r\n{"name":"Half"}`, () => socket.destroy())
    })
    socket.on('close', () => resolve())
  })
  expect((await keeper.call('GET', '/healthz')).status).toBe(200)
  expect(await countProgrammes()).toBe(0)
})

test('a request that a page of another site sends is refused before anything is done', async () => {
  const foreign: Record<string, string>[] = [{ 'sec-fetch-site': 'cross-site' }, { 'sec-fetch-site': 'same-site' }, { origin: 'https://elsewhere.example' }, { origin: 'null' }]
  for (const headers of foreign) {
    expect(problemOf(await keeper.call('POST', PROGRAMMES, { json: { name: 'From elsewhere' }, headers }))).toEqual([403, 'cross-site'])
  }
  expect(await countProgrammes()).toBe(0)
  expect((await keeper.call('GET', PROGRAMMES, { headers: { 'sec-fetch-site': 'cross-site' } })).status).toBe(200)
})

test('an unknown address and an unknown method are told apart, both as problems', async () => {
  expect(problemOf(await keeper.call('GET', '/api/v1/nowhere'))).toEqual([404, 'not-found'])
  expect(problemOf(await keeper.call('POST', '/api/v1/nowhere', { json: {} }))).toEqual([404, 'not-found'])
  expect(problemOf(await keeper.call('DELETE', PROGRAMMES))).toEqual([405, 'method-not-allowed'])
})

test('an id that can be none is answered like one that is unknown', async () => {
  const json = { isObserver: true, isAdministrator: false, coordinatorOf: [] }
  const malformed = await keeper.call('PATCH', '/api/v1/people/1%27%20OR%201', { json })
  const unknown = await keeper.call('PATCH', `/api/v1/people/${'a'.repeat(26)}`, { json })
  expect(malformed.json).toEqual(unknown.json)
  expect(problemOf(malformed)).toEqual([404, 'not-found'])
})

test('a visitor is asked to sign in where somebody without the right finds nothing', async () => {
  const visitor = server.client()
  expect(problemOf(await visitor.call('GET', '/api/v1/people'))).toEqual([401, 'sign-in-required'])
})

test('answers are not kept by caches', async () => {
  expect((await keeper.call('GET', '/api/v1/me')).headers.get('cache-control')).toBe('no-store')
})

test('a limit or a cursor that cannot be is refused by its name', async () => {
  const answer = await keeper.call('GET', '/api/v1/people?limit=1000&cursor=%7B')
  expect(answer.json.fields.map((field: { path: string }) => field.path)).toEqual(['limit'])
  expect((await keeper.call('GET', '/api/v1/people?cursor=%7B')).json.fields).toMatchObject([{ path: 'cursor' }])
})

test('a failure that nobody foresaw says nothing of its cause but the number it has in the log', async () => {
  const logged: { fields: object, message: string }[] = []
  const log = { ...house.ctx.log, error: (fields: object, message: string) => void logged.push({ fields, message }) }
  openHouse({ context: { ...house.ctx, log, get reads(): never { throw new Error('the disk is gone') } }, sessionCookie: { read: async () => null, write: async () => {}, clear: async () => {} }, actorOfSession: async () => null })
  const answer = await server.client().call('GET', PROGRAMMES)
  expect(problemOf(answer)).toEqual([500, 'internal'])
  expect(answer.text).not.toContain('disk')
  expect(logged).toHaveLength(1)
  const { requestId } = logged[0]!.fields as { requestId: string }
  expect(answer.json.detail).toContain(requestId)
})

test('while the house is not open, requests are told to come again', async () => {
  openHouse(null)
  expect(problemOf(await server.client().call('GET', PROGRAMMES))).toEqual([503, 'not-ready'])
})
