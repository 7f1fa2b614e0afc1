import { createHash } from 'node:crypto'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { readBatch, readRawFile } from '../../../server/services/batches/read-batch'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { addPairHouse } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { addPerson } from '../../builders/people'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { auditOf, countRows, uploadText } from '../../builders/uploads'
import { addTarget } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => { await house.close() })

const FILE = 'epoch,theta_deg,rho_arcsec\n2020.1,40.0,1.20\n2021.1,42.5,1.18\n'
const upload = (text: string | Buffer, rest: object = {}) => uploadText(pair.observer.ctx, { text, targetId: pair.target.id, ...rest })
const states = (items: { state: string }[]) => items.map(row => row.state)

describe('an upload', () => {
  it('keeps the bytes as they came, reads the rows into a draft and records it', async () => {
    const batch = await upload(FILE)
    expect(batch).toMatchObject({
      number: 1, kind: 'relative', fileName: 'measures.csv', rows: 2, good: 2, bad: 0, alreadyHere: 0, sent: 0, isMine: true, mayWithdraw: false,
      sha256: createHash('sha256').update(FILE).digest('hex'), byteCount: FILE.length, defaultTarget: { id: pair.target.id, name: 'Linden 12 AB' },
    })
    expect(batch.parts).toMatchObject([{ targetId: pair.target.id, state: 'draft', measures: 2 }])
    expect(batch.reading).toMatchObject({ encoding: 'UTF-8', columns: ['epoch', 'theta_deg', 'rho_arcsec'], unusedColumns: [], headerRow: 1 })
    expect((await readRawFile(pair.observer.ctx, batch.id)).bytes.toString()).toBe(FILE)
    expect(await auditOf(house, 'batch.uploaded')).toEqual([
      { event: 'batch.uploaded', subject_id: batch.id, actor_id: pair.observer.id, detail: { number: 1, sha256: batch.sha256, rows: 2, good: 2, bad: 0, alreadyHere: 0 } },
    ])
  })

  it('keeps the same bytes once, however often they come', async () => {
    const first = await upload(FILE)
    const second = await upload(FILE, { fileName: 'again.csv' })
    expect(second.sha256).toBe(first.sha256)
    expect(await countRows(house)).toMatchObject({ raw_file: 1, batch: 2 })
  })

  it('names the row, the column, the value, the reason and a remedy of a cell that cannot be read', async () => {
    const batch = await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n20230,361,0.94O\n')
    expect(states(batch.items)).toEqual(['good', 'bad'])
    expect(batch.items[1]!.problems.map(({ rowNumber, column, value }) => ({ rowNumber, column, value }))).toEqual([
      { rowNumber: 3, column: 'epoch', value: '20230' },
      { rowNumber: 3, column: 'theta_deg', value: '361' },
      { rowNumber: 3, column: 'rho_arcsec', value: '0.94O' },
    ])
    for (const problem of batch.items[1]!.problems) expect(problem.reason && problem.remedy).toBeTruthy()
  })

  it('finds targets by any of their names and says what to do about a name that nobody knows', async () => {
    const batch = await upload('target,epoch,theta_deg,rho_arcsec\nlnd 12,2020.1,40,1.2\nLinden 99,2021.1,41,1.2\n', { targetId: null })
    expect(batch.items.map(row => row.targetName)).toEqual(['Linden 12 AB', null])
    expect(batch.items[1]!.problems[0]).toMatchObject({ column: 'target', value: 'Linden 99', remedy: expect.stringMatching(/ask a coordinator/) as string })
  })

  it('asks for a target where neither the rows nor the upload name one', async () => {
    const batch = await upload(FILE, { targetId: null })
    expect(states(batch.items)).toEqual(['bad', 'bad'])
    expect(batch.parts).toEqual([])
  })

  it('counts a row that stands twice in the file once', async () => {
    const batch = await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n2020.10,40.0,1.200\n')
    expect(states(batch.items)).toEqual(['good', 'already-here'])
    expect(batch.items[1]!.problems).toHaveLength(1)
  })

  it('says of the same measures again that they are already here, and takes one new row beside them', async () => {
    const first = await upload(FILE)
    await sendBatch(pair.observer.ctx, first.id)
    expect(await upload(FILE)).toMatchObject({ good: 0, alreadyHere: 2 })
    expect(await upload(`${FILE}2022.1,45,1.17\n`)).toMatchObject({ good: 1, alreadyHere: 2 })
  })

  it('reads positions in the plane of the orbit', async () => {
    const sun = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'plane', name: 'Sun of 2026', diameterScaleArcmin: 31.99, caution: 'sun' })
    const batch = await upload('phi_deg,diameter_arcmin\n10.5,32.5\n', { kind: 'plane', targetId: sun.id })
    expect(batch).toMatchObject({ kind: 'plane', good: 1, bad: 0 })
  })
})

describe('an upload that cannot be used writes nothing', () => {
  it.each([
    ['empty', '', /file is empty/],
    ['column names only', 'epoch,theta_deg,rho_arcsec\n', /no row below them/],
    ['a picture', Buffer.from([0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A, 0, 0]), /a picture, not a text table/],
    ['unknown columns', 'a,b,c\n1,2,3\n', /No column says/],
    ['no column names', '2020.1,40,1.2\n2021.1,41,1.2\n', /not column names/],
  ])('%s', async (_what, text, sentence) => {
    const before = await countRows(house)
    const refused = await upload(text).catch((error: unknown) => error)
    expect(refused).toMatchObject({ code: 'file-unreadable', detail: expect.stringMatching(sentence) as string })
    expect(await countRows(house)).toEqual(before)
  })

  it('a target that is not there, or of another kind', async () => {
    const before = await countRows(house)
    await expect(upload(FILE, { targetId: 'a'.repeat(26) })).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'targetId' }] })
    await expect(upload('phi_deg,r\n1,1\n', { kind: 'plane' })).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'targetId' }] })
    expect(await countRows(house)).toEqual(before)
  })

  it('a person who is no observer, or nobody', async () => {
    const before = await countRows(house)
    for (const ctx of [house.ctx, pair.member.ctx, pair.coordinator.ctx]) {
      await expect(uploadText(ctx, { text: FILE, targetId: pair.target.id })).rejects.toMatchObject({ code: 'not-found' })
    }
    expect(await countRows(house)).toEqual(before)
  })
})

describe('a batch', () => {
  it("is its owner's alone while it is a draft", async () => {
    const batch = await upload(FILE)
    const other = await addPerson(house, { displayName: 'Ilka Soundraven', isObserver: true })
    for (const ctx of [house.ctx, other.ctx, pair.coordinator.ctx]) {
      await expect(readBatch(ctx, batch.id)).rejects.toMatchObject({ code: 'not-found' })
      await expect(readRawFile(ctx, batch.id)).rejects.toMatchObject({ code: 'not-found' })
    }
  })

  it('once sent shows its sent rows to all who are signed in, and all of it with the raw file to the coordinators', async () => {
    const batch = await upload(`${FILE}2022.1,45,\n2023.1,x,1\n`)
    await sendBatch(pair.observer.ctx, batch.id)
    expect(states((await readBatch(pair.member.ctx, batch.id)).items)).toEqual(['sent', 'sent', 'sent'])
    expect(states((await readBatch(pair.coordinator.ctx, batch.id)).items)).toEqual(['sent', 'sent', 'sent', 'bad'])
    expect((await readRawFile(pair.coordinator.ctx, batch.id)).fileName).toBe('measures.csv')
    await expect(readRawFile(pair.member.ctx, batch.id)).rejects.toMatchObject({ code: 'not-found' })
    await expect(readBatch(house.ctx, batch.id)).rejects.toMatchObject({ code: 'not-found' })
  })
})
