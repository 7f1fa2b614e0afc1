import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { canonicalJson } from '../../../server/domain/canonical-json'
import { buildFitRequest } from '../../../server/domain/fit-request'
import { listStandingMeasures } from '../../../server/repositories/measure-repository'
import { parsedRowOf } from '../../../server/repositories/measure-columns'
import { getFit } from '../../../server/repositories/fit-repository'
import { getTarget } from '../../../server/repositories/target-repository'
import { ROWS_IN_VIEW } from '../../../shared/schemas/batches'
import type { BatchRowView, BatchView } from '../../../shared/schemas/batches'
import type { Page } from '../../../shared/schemas/ids'
import { mountServer } from '../../builders/mounted-server'
import type { MountedServer } from '../../builders/mounted-server'
import { addPerson } from '../../builders/people'
import { addPairHouse } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { addTarget } from '../../builders/work'

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

const cookie = () => server.cookieOf(pair.observer.sessionId)
const get = (path: string, headers = cookie()) => server.client().call('GET', `/api/v1${path}`, { headers })

/** A file of so many measures, no two alike; θ of the rows named is no number. */
function fileOf(count: number, { from = 1700, bad = [] as number[] } = {}): string {
  const rows = Array.from({ length: count }, (_, i) => {
    const theta = bad.includes(i + 2) ? 'x' : ((i * 37.13) % 360).toFixed(2)
    return `${(from + (i * 300) / count).toFixed(5)},${theta},${(0.5 + (i % 1000) / 1000).toFixed(4)},${i % 2 === 0 ? 'T. Orrowin' : 'R. Quellmann'}`
  })
  return `epoch,theta_deg,rho_arcsec,observer\n${rows.join('\n')}\n`
}

async function upload(text: string, targetId: string): Promise<BatchView> {
  const query = new URLSearchParams({ fileName: 'measures.csv', kind: 'relative', targetId }).toString()
  const answer = await server.client().call('POST', `/api/v1/batches?${query}`, { body: text, headers: { ...cookie(), 'content-type': 'text/csv' } })
  expect(answer.status).toBe(201)
  return answer.json as BatchView
}
const send = (batchId: string) => server.client().call('POST', `/api/v1/batches/${batchId}/send`, { json: {}, headers: cookie() })

/** Asks for a list again and again until the work is done; the answers that came before. */
async function listMeanwhile(work: Promise<unknown>): Promise<{ rows: number; sent: number }[]> {
  const progress = { isOver: false }
  const ending = work.finally(() => { progress.isOver = true })
  const seen: { rows: number; sent: number }[] = []
  for (;;) {
    const { json } = await get('/batches?mine=1')
    if (progress.isOver) break
    const [newest] = json.items as { rows: number; sent: number }[]
    seen.push(newest ? { rows: newest.rows, sent: newest.sent } : { rows: 0, sent: 0 })
  }
  await ending
  return seen
}

/** Far more than could be answered before and after one long piece of work. */
const MANY = 10

describe('ten thousand rows', () => {
  it('are read and sent while others are answered, who see all of it or nothing', async () => {
    const uploading = upload(fileOf(10_000), pair.target.id)
    const duringUpload = await listMeanwhile(uploading)
    expect(duringUpload.length).toBeGreaterThan(MANY)
    expect(new Set(duringUpload.map(({ rows }) => rows))).toContain(0)
    expect(duringUpload.filter(({ rows }) => rows !== 0 && rows !== 10_000)).toEqual([])

    const sending = send((await uploading).id)
    const duringSending = await listMeanwhile(sending)
    expect(duringSending.length).toBeGreaterThan(MANY)
    expect(duringSending.filter(({ sent }) => sent !== 0 && sent !== 10_000)).toEqual([])
    expect((await sending).json).toMatchObject({ sent: 10_000, alreadyHere: 0, keptAsDraft: 0 })
    expect((await get('/batches?mine=1')).json.items[0]).toMatchObject({ rows: 10_000, good: 0, sent: 10_000 })
  })

  it('make one fit of them all, its request the canonical text of the measures by time', async () => {
    const reads = house.database.reads
    const { id } = await reads.selectFrom('fit').select('id').where('target_id', '=', pair.target.id).executeTakeFirstOrThrow()
    const standing = await listStandingMeasures(reads, pair.target.id)
    const epochs = standing.map(measure => measure.epoch_yr!)
    expect(epochs).toHaveLength(10_000)
    expect(epochs).toEqual([...epochs].sort((a, b) => a - b))
    const measures = standing.map(measure => ({ id: measure.id, observer: measure.observer_name, row: parsedRowOf(measure) }))
    const request = buildFitRequest(await getTarget(reads, pair.target.id), measures, { setAside: new Set() })
    expect((await getFit(reads, id)).request).toBe(canonicalJson(request))
  })

  it('are all recognised when they come again', async () => {
    expect(await upload(fileOf(10_000), pair.target.id)).toMatchObject({ rows: 10_000, good: 0, alreadyHere: 10_000 })
  })
})

describe('a batch with more rows than one view holds', () => {
  const COUNT = ROWS_IN_VIEW + 200
  let batch: BatchView
  beforeAll(async () => {
    const target = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 40 AB' })
    batch = await upload(fileOf(COUNT, { bad: [1150, COUNT + 1] }), target.id)
  })

  it('shows the rows to mend, fills up from the top, and says how many it leaves out', () => {
    expect(batch).toMatchObject({ rows: COUNT, bad: 2, good: COUNT - 2, rowsNotShown: 200 })
    expect(batch.items).toHaveLength(ROWS_IN_VIEW)
    expect(batch.items.map(row => row.rowNumber)).toEqual([...Array.from({ length: ROWS_IN_VIEW - 2 }, (_, i) => i + 2), 1150, COUNT + 1])
    expect(batch.items.filter(row => row.state === 'bad').map(row => row.rowNumber)).toEqual([1150, COUNT + 1])
  })

  it('answers all its rows page by page, in the order of the file', async () => {
    const rows: BatchRowView[] = []
    let cursor: string | null = null
    do {
      const page: Page<BatchRowView> = (await get(`/batches/${batch.id}/rows?limit=200${cursor ? `&cursor=${cursor}` : ''}`)).json
      rows.push(...page.items)
      cursor = page.nextCursor
    } while (cursor)
    expect(rows.map(row => row.rowNumber)).toEqual(Array.from({ length: COUNT }, (_, i) => i + 2))
    expect(rows[0]).toEqual(batch.items[0])
  })

  it('keeps the row that was just mended in view', async () => {
    const last = batch.items.at(-1)!
    const { json: mended } = await server.client().call('PATCH', `/api/v1/batches/${batch.id}/rows/${last.id}`, { json: { cells: { theta_deg: '12' } }, headers: cookie() })
    expect(mended).toMatchObject({ bad: 1, rowsNotShown: 200 })
    expect(mended.items.at(-1)).toMatchObject({ id: last.id, state: 'good' })
  })

  it('shows others its sent rows alone, by view and by page', async () => {
    expect((await send(batch.id)).json).toMatchObject({ sent: COUNT - 1, keptAsDraft: 1 })
    const other = await addPerson(house, { displayName: 'Ilka Soundraven' })
    const theirs = server.cookieOf(other.sessionId)
    const { json: view } = await get(`/batches/${batch.id}`, theirs)
    expect(view).toMatchObject({ rowsNotShown: COUNT - 1 - ROWS_IN_VIEW })
    expect(new Set(view.items.map((row: BatchRowView) => row.state))).toEqual(new Set(['sent']))
    const page = await get(`/batches/${batch.id}/rows?limit=200&cursor=${Buffer.from('[1140]').toString('base64url')}`, theirs)
    expect(page.json.items.map((row: BatchRowView) => row.rowNumber)).not.toContain(1150)
    expect(page.json.nextCursor).toBeNull()
  })
})
