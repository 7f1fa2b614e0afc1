import { connect } from 'node:net'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { freshDataDir, startServer } from './support/running-server'
import type { RunningServer } from './support/running-server'

let server: RunningServer
beforeAll(async () => { server = await startServer({ dataDir: freshDataDir() }) })
afterAll(async () => { await server.stop() })

/** What the server answers to these very bytes. */
function exchange(text: string): Promise<string> {
  const { hostname, port } = new URL(server.origin)
  return new Promise((resolve, reject) => {
    const socket = connect(Number(port), hostname, () => socket.write(text))
    let answer = ''
    socket.setEncoding('utf8').on('data', (part: string) => { answer += part }).on('end', () => resolve(answer)).on('error', reject)
  })
}

test('HEAD answers like GET, without a body', async () => {
  for (const path of ['/api/v1/orbits', '/healthz', '/']) {
    const answer = await exchange(`HEAD ${path} HTTP/1.1\r\nHost: 127.0.0.1\r\nConnection: close\r\n\r\n`)
    const [head, body] = answer.split('\r\n\r\n')
    expect(head).toMatch(/^HTTP\/1\.1 200 /)
    expect(body).toBe('')
  }
})

test('TRACE is refused, and so is an unknown method on a page', async () => {
  for (const method of ['TRACE', 'PROPFIND']) {
    expect(await exchange(`${method} / HTTP/1.1\r\nHost: 127.0.0.1\r\nConnection: close\r\n\r\n`)).toMatch(/^HTTP\/1\.1 405 /)
  }
})

test('every answer carries the headers that keep browsers from guessing, framing and telling others', async () => {
  for (const path of ['/', '/api/v1/orbits', '/nowhere', '/api/v1/nowhere']) {
    const { headers } = await fetch(`${server.origin}${path}`)
    expect(headers.get('x-content-type-options')).toBe('nosniff')
    expect(headers.get('referrer-policy')).toBe('no-referrer')
    expect(headers.get('access-control-allow-origin')).toBeNull()
    expect(headers.get('x-powered-by')).toBeNull()
  }
  const page = await fetch(`${server.origin}/`)
  expect(page.headers.get('content-security-policy')).toContain(`default-src 'none'`)
  expect(page.headers.get('content-security-policy')).toContain(`frame-ancestors 'none'`)
})

test('a visitor is given no session', async () => {
  for (const path of ['/', '/orbits', '/sign-in', '/api/v1/me']) {
    const cookies = (await fetch(`${server.origin}${path}`)).headers.getSetCookie()
    expect(cookies.filter(cookie => cookie.startsWith('semilatus='))).toEqual([])
  }
})

test('an API address that does not exist answers as a problem, not as a page', async () => {
  const answer = await fetch(`${server.origin}/api/v1/nowhere`)
  expect(answer.status).toBe(404)
  expect(answer.headers.get('content-type')).toBe('application/problem+json')
})
