import { join } from 'node:path'
import Sqlite from 'better-sqlite3'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { pairFile } from '../builders/measure-files'
import { createClient } from '../builders/mounted-server'
import { TRUE_PAIR } from '../builders/published-pair'
import { simulatePair, unevenEpochs } from '../builders/simulated-measures'
import { fillHouse, PASSWORD } from './support/house-before-start'
import { freshDataDir, startServer } from './support/running-server'
import type { RunningServer } from './support/running-server'

let server: RunningServer
let house: Awaited<ReturnType<typeof fillHouse>>
let client: ReturnType<typeof createClient>
beforeEach(async () => {
  const dataDir = freshDataDir()
  house = await fillHouse(dataDir)
  server = await startServer({ dataDir })
  client = createClient(server.origin)
  expect((await client.call('POST', '/api/v1/session', { json: { email: house.signIns.observer, password: PASSWORD } })).status).toBe(200)
})
afterEach(async () => { await server.stop() })

const NOISE = { sigmaThetaDeg: 0.6, sigmaRhoArcsec: 0.008 }

function fileOf(count: number, seed: number): string {
  return pairFile(simulatePair(TRUE_PAIR, unevenEpochs({ from: 1980, count, stepYr: 60 / count, seed }), { ...NOISE, seed }), NOISE)
}

function upload(text: string, name: string) {
  return client.call('POST', `/api/v1/batches?fileName=${name}&kind=relative&targetId=${house.targetId}`, { body: text, headers: { 'content-type': 'text/csv' } })
}

/** Asks the database file itself, as it lies there. */
function query<Row>(sql: string): Row[] {
  const database = new Sqlite(join(server.dataDir, 'semilatus.sqlite3'))
  try {
    return database.prepare(sql).all() as Row[]
  }
  finally {
    database.close()
  }
}

function gate() {
  let open!: () => void
  const opened = new Promise<void>((resolve) => { open = resolve })
  return { open, opened }
}

async function until<Value>(ask: () => Value | undefined | Promise<Value | undefined>): Promise<Value> {
  for (;;) {
    const value = await ask()
    if (value !== undefined) return value
    await new Promise(resolve => setTimeout(resolve, 5))
  }
}

function expectSound(): void {
  expect(query('PRAGMA integrity_check')).toEqual([{ integrity_check: 'ok' }])
  expect(query('PRAGMA foreign_key_check')).toEqual([])
}

test('a power cut during uploads loses none that was acknowledged, and leaves none half-written', async () => {
  const rowCount = 400
  const acknowledged: string[] = []
  const thirdIsHere = gate()
  // Each of four goes on uploading until the power is cut, so that the cut falls into work under way.
  const sending = Array.from({ length: 4 }, async (_, lane) => {
    for (let index = lane; ; index += 4) {
      const answer = await upload(fileOf(rowCount, index + 1), `night-${index}.csv`)
      if (answer.status === 201 && acknowledged.push(answer.json.id) === 3) thirdIsHere.open()
    }
  })
  const ended = Promise.allSettled(sending)
  await thirdIsHere.opened
  await server.killHard()
  expect((await ended).map(outcome => outcome.status)).toEqual(['rejected', 'rejected', 'rejected', 'rejected'])

  await server.restart()
  expectSound()
  const kept = query<{ id: string, rows: number, bytes: number, audits: number }>(`SELECT id,
    (SELECT count(*) FROM batch_row r WHERE r.batch_id = batch.id) AS rows,
    (SELECT count(*) FROM raw_file f WHERE f.sha256 = batch.raw_sha256) AS bytes,
    (SELECT count(*) FROM audit_event a WHERE a.event = 'batch.uploaded' AND a.subject_id = batch.id) AS audits FROM batch`)
  expect(kept.map(batch => batch.id)).toEqual(expect.arrayContaining(acknowledged))
  for (const batch of kept) expect(batch).toEqual({ id: batch.id, rows: rowCount, bytes: 1, audits: 1 })
  expect((await client.call('GET', `/api/v1/batches/${acknowledged[0]}`)).json.items).toHaveLength(rowCount)
})

test('a power cut during a fit is made up for at the next start: one fit, one record of it, the second try', async () => {
  const batch = await upload(fileOf(2000, 77), 'season.csv')
  const sent = await client.call('POST', `/api/v1/batches/${batch.json.id}/send`, { json: {} })
  expect(sent.json.sent).toBe(2000)
  const { fitId } = sent.json.fits[0]
  const job = () => query<{ state: string, attempts: number, progress_stage: string | null }>(`SELECT state, attempts, progress_stage FROM job WHERE name = 'run-fit'`)
  await until(() => job().find(({ state, progress_stage }) => state !== 'queued' && progress_stage !== null))
  await server.killHard()
  expect(job()).toMatchObject([{ state: 'running', attempts: 1 }])
  expect(query('SELECT state, result FROM fit')).toEqual([{ state: 'running', result: null }])

  await server.restart()
  await until(() => job()[0]!.state === 'done' || undefined)
  expect((await client.call('GET', `/api/v1/fits/${fitId}`)).json.state).toBe('done')
  expect(job()).toMatchObject([{ state: 'done', attempts: 2 }])
  expect(query('SELECT id, state FROM fit')).toEqual([{ id: fitId, state: 'done' }])
  expect(query(`SELECT subject_id FROM audit_event WHERE event = 'fit.done'`)).toEqual([{ subject_id: fitId }])
  expect(query('SELECT count(*) AS measures FROM measure')).toEqual([{ measures: 2000 }])
  expectSound()
})
