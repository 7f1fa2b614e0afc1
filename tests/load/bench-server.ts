/**
 * npm run bench:server [-- CONNECTIONS]: 500 requests each to a list route and a public edition page while two fits run throughout. Prints the
 * p99 of each beside its goal. Loopback only; ends by itself.
 */
import { randomBytes } from 'node:crypto'
import { rmSync } from 'node:fs'
import { join } from 'node:path'
import autocannon from 'autocannon'
import Sqlite from 'better-sqlite3'
import type { TargetView } from '../../shared/schemas/targets'
import { fillDemo, STORY_BEGINS } from '../builders/demo/demo-story'
import { openHouseAt } from '../builders/house-at'
import { pairFile } from '../builders/measure-files'
import { createClient } from '../builders/mounted-server'
import { TRUE_PAIR } from '../builders/published-pair'
import { simulatePair, unevenEpochs } from '../builders/simulated-measures'
import { addTarget, uploadAndSend } from '../builders/work'
import { freshDataDir, startServer } from '../e2e/support/running-server'

const REQUESTS = 500
const CONNECTIONS = Number(process.argv[2] ?? 1)
const MEASURES = 300
const NOISE = { sigmaThetaDeg: 0.6, sigmaRhoArcsec: 0.008 }
const GOALS = [
  { what: 'list route', path: '/api/v1/orbits', goalMs: 50 },
  { what: 'public edition page', path: '', goalMs: 150 },
]

type Client = ReturnType<typeof createClient>

/** The demo, and two pairs with enough measures that a fit of them takes a while. */
async function fill(dataDir: string) {
  const house = await openHouseAt({ dataDir, baseUrl: 'http://127.0.0.1', startAt: STORY_BEGINS })
  const passwords = Array.from({ length: 12 }, () => randomBytes(9).toString('base64url'))
  const demo = await fillDemo({ house, passwords })
  const heavy: TargetView[] = []
  for (const [k, name] of ['Aspen 1 AB', 'Aspen 2 AB'].entries()) {
    const target = await addTarget(demo.cast.people.mirelle.ctx, { programmeId: demo.cast.pairs.id, kind: 'relative', name })
    const measures = simulatePair(TRUE_PAIR, unevenEpochs({ from: 1980, count: MEASURES, stepYr: 45 / MEASURES, seed: k + 1 }), { ...NOISE, seed: k + 10 })
    await uploadAndSend(demo.cast.people.ossian.ctx, { text: pairFile(measures, NOISE), fileName: `${name}.csv`, target })
    heavy.push(target)
  }
  await house.close()
  return { coordinator: demo.signIns[1]!, editionPath: `/orbits/${demo.linden12.id}/2`, heavy: heavy.map(target => target.id) }
}

/**
 * Asks for one fit after the other of a target, each with another measure set aside, until told to end. Whether a fit is done is
 * read from the database file, so that waiting costs the server nothing.
 */
async function keepFitting({ client, database, targetId, isOver }: { client: Client, database: Sqlite.Database, targetId: string, isOver: () => boolean }): Promise<number> {
  const measures = database.prepare('SELECT id FROM measure WHERE target_id = ?').pluck().all(targetId) as string[]
  const going = database.prepare(`SELECT count(*) FROM fit WHERE target_id = ? AND state IN ('queued', 'running')`).pluck()
  for (let asked = 0; ; asked++) {
    while (going.get(targetId) !== 0) await new Promise(resolve => setTimeout(resolve, 5))
    if (isOver()) return asked
    const setAside = [{ measureId: measures[asked]!, reason: 'left out for the sake of another fit' }]
    const answer = await client.call('POST', `/api/v1/targets/${targetId}/fits`, { json: { setAside } })
    if (answer.status !== 201) throw new Error(`The refit was answered with ${answer.status}: ${JSON.stringify(answer.json)}`)
  }
}

async function main() {
  const dataDir = freshDataDir()
  const filled = await fill(dataDir)
  const server = await startServer({ dataDir, env: { SEMILATUS_LOG_LEVEL: 'error' } })
  const database = new Sqlite(join(dataDir, 'semilatus.sqlite3'), { readonly: true })
  let isOver = false
  try {
    const client = createClient(server.origin)
    const signedIn = await client.call('POST', '/api/v1/session', { json: { email: filled.coordinator.email, password: filled.coordinator.password } })
    if (signedIn.status !== 200) throw new Error(`Sign-in failed with ${signedIn.status}.`)
    const fitting = filled.heavy.map(targetId => keepFitting({ client, database, targetId, isOver: () => isOver }))
    let isMissed = false
    for (const { what, path, goalMs } of GOALS) {
      const result = await autocannon({ url: server.origin + (path || filled.editionPath), connections: CONNECTIONS, amount: REQUESTS, timeout: 30 })
      const isMet = result.latency.p99 < goalMs && result.non2xx === 0 && result.errors === 0
      isMissed ||= !isMet
      console.log(`${what.padEnd(20)} ${REQUESTS} requests, ${CONNECTIONS} at a time: p50 ${result.latency.p50} ms, p99 ${result.latency.p99} ms (goal ${goalMs} ms: ${isMet ? 'met' : 'missed'}); ${result.non2xx} not 2xx, ${result.errors} errors`)
    }
    isOver = true
    console.log(`fits finished meanwhile: ${(await Promise.all(fitting)).join(' and ')}, of ${MEASURES} measures each`)
    process.exitCode = isMissed ? 1 : 0
  }
  finally {
    isOver = true
    database.close()
    await server.stop()
    rmSync(dataDir, { recursive: true, force: true })
  }
}

await main()
