import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { mountServer } from '../../builders/mounted-server'
import type { MountedServer } from '../../builders/mounted-server'
import { listRouteFiles } from '../../builders/route-files'
import { createTestHouse } from '../../builders/test-house'
import { makeScene, ROLES } from './scene'
import type { Role, Scene } from './scene'
import { TABLE } from './table'
import type { Case } from './table'

let folder: string
let scene: Scene
let server: MountedServer
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'semilatus-'))
  scene = await makeScene(folder)
  const first = await createTestHouse({ copyOf: scene.databaseFile })
  server = await mountServer(first)
  await first.close()
})
afterAll(async () => {
  await server.close()
  await rm(folder, { recursive: true })
})

test('every route has a row in the table, and every row a route', async () => {
  const routes = (await listRouteFiles()).map(({ method, path }) => `${method} ${path}`)
  expect([...new Set(TABLE.map(row => row.route))].sort()).toEqual(routes.sort())
})

const cases = TABLE.flatMap(row => ROLES.map((role, index) => ({ row, role, status: row.expect[index]!, name: `${row.route}${row.about ? ` (${row.about})` : ''}` })))

test.each(cases)('$name answers $status to the $role', async ({ row, role, status }) => {
  const house = await createTestHouse({ copyOf: scene.databaseFile, seed: 'case' })
  try {
    server.serve(house)
    const answer = await call(row, role)
    expect(answer.status, answer.text).toBe(status)
  }
  finally {
    await house.close()
  }
})

async function call(row: Case, role: Role): Promise<{ status: number, text: string }> {
  const [method, pattern] = row.route.split(' ') as [string, string]
  const path = pattern.replace(/:(\w+)|\*\*/g, (found) => {
    const value = row.params![found.replace(':', '')]!
    return typeof value === 'string' ? scene.things[value] : value.text
  })
  const sessionId = scene.sessions[role]
  const response = await fetch(`${server.baseUrl}${path}${row.query ? `?${row.query(scene.things)}` : ''}`, {
    method: method === 'ALL' ? 'GET' : method,
    headers: {
      ...(sessionId ? server.cookieOf(sessionId) : {}),
      ...(row.json ? { 'content-type': 'application/json' } : {}),
      ...(row.text ? { 'content-type': 'text/csv' } : {}),
      ...(row.ifMatch ? { 'if-match': `"${scene.versions[row.ifMatch]}"` } : {}),
    },
    body: row.json ? JSON.stringify(row.json(scene.things)) : row.text ?? null,
  })
  // A stream of events has no end of its own.
  const isStream = response.headers.get('content-type')?.startsWith('text/event-stream')
  const text = isStream ? '' : await response.text()
  if (isStream) await response.body?.cancel()
  return { status: response.status, text }
}
