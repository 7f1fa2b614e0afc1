import { connect } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { UPLOAD_CAP_BYTES } from '../../../shared/schemas/batches'
import { mountServer } from '../../builders/mounted-server'
import type { MountedServer } from '../../builders/mounted-server'
import { addPairHouse } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { countRows } from '../../builders/uploads'

let house: TestHouse
let pair: PairHouse
let server: MountedServer
beforeAll(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
  server = await mountServer(house)
})
afterAll(async () => {
  await server.close()
  await house.close()
})

const FILE = 'epoch,theta_deg,rho_arcsec\n2020.1,40.0,1.20\n'
const cookie = () => server.cookieOf(pair.observer.sessionId)
const path = (query: Record<string, string> = {}) => `/api/v1/batches?${new URLSearchParams({ fileName: 'measures.csv', kind: 'relative', targetId: pair.target.id, ...query }).toString()}`
const post = (body: BodyInit, { query = {}, ...headers }: { query?: Record<string, string>; [header: string]: unknown } = {}) =>
  server.client().call('POST', path(query), { body, headers: { ...cookie(), 'content-type': 'text/csv', ...headers as Record<string, string> } })

/** A body without Content-Length, sent in chunks. */
function chunked(byteCount: number): ReadableStream<Uint8Array> {
  let sent = 0
  return new ReadableStream({
    pull(controller) {
      if (sent >= byteCount) return controller.close()
      const chunk = new Uint8Array(Math.min(65_536, byteCount - sent)).fill(0x31)
      sent += chunk.byteLength
      controller.enqueue(chunk)
    },
  })
}

describe('a file over HTTP', () => {
  it.each(['text/csv', 'text/csv; charset=utf-8', 'text/tab-separated-values', 'text/plain', 'application/octet-stream'])('is taken as %s', async (type) => {
    const answer = await post(FILE, { 'content-type': type })
    expect(answer.status).toBe(201)
    expect(answer.json).toMatchObject({ rows: 1, good: 1 })
  })

  it('comes back byte for byte, as a file to keep and never as a page', async () => {
    const { json: { id } } = await post(FILE, { query: { fileName: 'März "1".html' } })
    const answer = await server.client().call('GET', `/api/v1/batches/${id}/raw`, { headers: cookie() })
    expect(answer.status).toBe(200)
    expect(answer.text).toBe(FILE)
    expect(answer.headers.get('content-type')).toBe('application/octet-stream')
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff')
    expect(answer.headers.get('content-disposition')).toBe(`attachment; filename="M_rz _1_.html"; filename*=UTF-8''M%C3%A4rz%20%221%22.html`)
  })

  it.each([
    ['a form', 'multipart/form-data; boundary=x', 415, 'file-type-unsupported'],
    ['a form of another kind', 'application/x-www-form-urlencoded', 415, 'file-type-unsupported'],
    ['no type at all', '', 415, 'file-type-unsupported'],
    ['a spreadsheet', 'application/vnd.ms-excel', 415, 'file-type-unsupported'],
  ])('is refused as %s, with nothing written', async (_what, type, status, code) => {
    const before = await countRows(house)
    const answer = await server.client().call('POST', path(), { body: new Uint8Array(Buffer.from(FILE)), headers: { ...cookie(), ...(type ? { 'content-type': type } : {}) } })
    expect(answer).toMatchObject({ status, json: { code } })
    expect(answer.headers.get('content-type')).toBe('application/problem+json')
    expect(await countRows(house)).toEqual(before)
  })

  it('is refused over the cap, with Content-Length and without, with nothing written and the server alive', async () => {
    const before = await countRows(house)
    for (const body of [new Uint8Array(UPLOAD_CAP_BYTES + 1).fill(0x31), chunked(UPLOAD_CAP_BYTES + 1), chunked(3 * UPLOAD_CAP_BYTES)]) {
      expect(await post(body)).toMatchObject({ status: 413, json: { code: 'body-too-large', detail: expect.stringMatching(/8 MB.*Split it/) as string } })
    }
    expect(await countRows(house)).toEqual(before)
    expect((await post(FILE)).status).toBe(201)
  })

  it('that breaks off in the middle leaves nothing behind', async () => {
    const before = await countRows(house)
    const { hostname, port } = new URL(server.baseUrl)
    const socket = connect(Number(port), hostname)
    await new Promise<void>(resolve => socket.write(`POST ${path()} HTTP/1.1\r\nHost: ${hostname}:${port}\r\nCookie: ${cookie().cookie}\r\nContent-Type: text/csv\r\nContent-Length: 1000\r\n\r\n${FILE}`, () => resolve()))
    await new Promise<void>((resolve) => {
      socket.once('close', () => resolve())
      setTimeout(() => socket.destroy(), 50)
    })
    expect((await post(FILE)).status).toBe(201)
    expect(await countRows(house)).toMatchObject({ batch: before.batch! + 1 })
  })

  it.each([
    ['empty', '', {}, 422, 'file-unreadable'],
    ['holding column names only', 'epoch,theta_deg,rho_arcsec\n', {}, 422, 'file-unreadable'],
    ['of another kind than its target', FILE, { kind: 'equatorial' }, 422, 'input-invalid'],
    ['of a kind that nobody knows', FILE, { kind: 'square' }, 422, 'input-invalid'],
    ['without a name', FILE, { fileName: ' ' }, 422, 'input-invalid'],
    ['for no target here', FILE, { targetId: 'a'.repeat(26) }, 422, 'input-invalid'],
  ])('is refused when %s', async (_what, body, query, status, code) => {
    expect(await post(body, { query })).toMatchObject({ status, json: { code } })
  })

  it('is refused to visitors, to people who are no observers and to pages of other sites, before a byte is read', async () => {
    const before = await countRows(house)
    const call = (headers: Record<string, string>) => server.client().call('POST', path(), { body: FILE, headers: { 'content-type': 'text/csv', ...headers } })
    expect(await call({})).toMatchObject({ status: 401, json: { code: 'sign-in-required' } })
    expect(await call(server.cookieOf(pair.member.sessionId))).toMatchObject({ status: 404, json: { code: 'not-found' } })
    expect(await call({ ...cookie(), 'sec-fetch-site': 'cross-site' })).toMatchObject({ status: 403, json: { code: 'cross-site' } })
    expect(await countRows(house)).toEqual(before)
  })
})
