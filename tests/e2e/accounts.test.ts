import { afterAll, beforeAll, expect, test } from 'vitest'
import { createClient } from '../builders/mounted-server'
import { freshDataDir, startServer } from './support/running-server'
import type { RunningServer } from './support/running-server'

let server: RunningServer
beforeAll(async () => { server = await startServer({ dataDir: freshDataDir() }) })
afterAll(async () => { await server.stop() })

const account = { email: 'keeper@example.org', displayName: 'Ilka Soundraven', password: 'a long enough password' }
const linkInLog = () => [...server.log().matchAll(/\/invitation\/([a-z2-7]{52})/g)].at(-1)?.[1]
const me = async (client: ReturnType<typeof createClient>) => (await client.call('GET', '/api/v1/me')).json.me

test('an empty database prints a link that makes the first administrator, a new one at each start, and none after that', async () => {
  const first = linkInLog()!
  await server.killHard()
  await server.restart()
  const second = linkInLog()!
  expect(second).not.toBe(first)
  const client = createClient(server.origin)
  expect((await client.call('POST', `/api/v1/invitations/${first}/accept`, { json: account })).status).toBe(410)
  const answer = await client.call('POST', `/api/v1/invitations/${second}/accept`, { json: account })
  expect(answer.json.me).toMatchObject({ isAdministrator: true })
  await server.killHard()
  await server.restart()
  expect(linkInLog()).toBe(second)
})

test('the session lies sealed in a cookie that scripts cannot read, and survives a restart of the server', async () => {
  const client = createClient(server.origin)
  const answer = await client.call('POST', '/api/v1/session', { json: account })
  const cookie = answer.headers.get('set-cookie')!
  expect(cookie).toMatch(/^semilatus=Fe26\.2\*/)
  expect(cookie).toMatch(/; HttpOnly/)
  expect(cookie).toMatch(/; SameSite=Lax/)
  expect(cookie).not.toMatch(/; Secure/) // http://127.0.0.1; over https it is
  await server.killHard()
  await server.restart()
  expect(await me(client)).toMatchObject({ displayName: 'Ilka Soundraven' })
  expect((await client.call('GET', '/api/_auth/session')).text).not.toContain('sessionId')
})

test('signing out ends the session itself: a copy of the cookie is refused on the very next call', async () => {
  const client = createClient(server.origin)
  await client.call('POST', '/api/v1/session', { json: account })
  const copy = client.copy()
  expect(await me(copy)).not.toBeNull()
  await client.call('DELETE', '/api/v1/session')
  expect((await copy.call('GET', '/api/v1/people')).status).toBe(401)
  expect(await me(copy)).toBeNull()
})

test('a cookie that was tampered with is no session and no failure', async () => {
  for (const value of ['Fe26.2*nonsense', 'x', '%00', `Fe26.2**${'a'.repeat(64)}*b*c*d*e*f`]) {
    const answer = await createClient(server.origin).call('GET', '/api/v1/me', { headers: { cookie: `semilatus=${value}` } })
    expect(answer.json).toEqual({ me: null })
  }
})

test('the log has one JSON line a request, without addresses, names, passwords or secrets of links', async () => {
  await createClient(server.origin).call('POST', '/api/v1/session', { json: { ...account, password: 'a wrong password' } })
  const linesNow = () => server.log().split('\n').filter(line => line.startsWith('{') && line.endsWith('}')).map(line => JSON.parse(line) as Record<string, unknown>)
  // The line is written after the answer has gone out.
  await expect.poll(() => linesNow().some(line => line.msg === 'request' && line.route === '/api/v1/session' && line.status === 401)).toBe(true)
  const lines = linesNow()
  const text = JSON.stringify(lines)
  for (const secret of [account.email, account.displayName, account.password, 'a wrong password', linkInLog()!, '127.0.0.1"']) expect(text).not.toContain(secret)
})

test('SIGTERM ends the server cleanly: a page that listens to events sees its stream end, and the exit code is 0', async () => {
  const own = await startServer({ dataDir: freshDataDir() })
  const client = createClient(own.origin)
  const token = own.log().match(/\/invitation\/([a-z2-7]{52})/)![1]
  const { json, headers } = await client.call('POST', `/api/v1/invitations/${token}/accept`, { json: account })
  const programme = await client.call('POST', '/api/v1/programmes', { json: { name: 'Wide pairs' } })
  await client.call('PATCH', `/api/v1/people/${json.me.personId}`, { json: { isObserver: true, isAdministrator: true, coordinatorOf: [programme.json.id] } })
  const stream = await fetch(`${own.origin}/api/v1/events?topics=desk`, { headers: { cookie: headers.get('set-cookie')!.split(';')[0]! } })
  expect(stream.status).toBe(200)
  const [code, text] = await Promise.all([own.stop(), stream.text()])
  expect(code).toBe(0)
  expect(text).toContain(':\n\n')
})

test('a setting that cannot be used ends the start with a sentence that names it', async () => {
  await expect(startServer({ dataDir: freshDataDir(), env: { SEMILATUS_MAIL: 'pigeon' } })).rejects.toThrow(/SEMILATUS_MAIL is "pigeon"/)
})
