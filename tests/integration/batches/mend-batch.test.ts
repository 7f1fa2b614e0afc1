import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { chooseTarget } from '../../../server/services/batches/choose-target'
import { discardBatch } from '../../../server/services/batches/discard-batch'
import { listBatches } from '../../../server/services/batches/list-batches'
import { mendRow } from '../../../server/services/batches/mend-row'
import { readBatch } from '../../../server/services/batches/read-batch'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { addPerson } from '../../builders/people'
import { addPairHouse } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
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
const upload = (text: string, targetId: string | null = pair.target.id) => uploadText(pair.observer.ctx, { text, targetId })
const others = async () => [house.ctx, pair.member.ctx, pair.coordinator.ctx, (await addPerson(house, { displayName: 'Ilka Soundraven', isObserver: true })).ctx]

describe('mending a row', () => {
  it('reads it anew, keeps what the file said beside it and records which columns changed', async () => {
    const { id, items: [, wrong] } = await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n2021.1,42.5,0.94O\n')
    const mended = await mendRow(pair.observer.ctx, { batchId: id, rowId: wrong!.id, cells: { rho_arcsec: '0.940' } })
    expect(mended).toMatchObject({ good: 2, bad: 0, version: 2 })
    expect(mended.items[1]).toMatchObject({ state: 'good', cells: { rho_arcsec: '0.940', theta_deg: '42.5' }, originalCells: { rho_arcsec: '0.94O' }, problems: [] })
    expect(await auditOf(house, 'batch.row-mended')).toMatchObject([{ subject_id: id, actor_id: pair.observer.id, detail: { rowNumber: 3, columns: ['rho_arcsec'] } }])
  })

  it('keeps earlier mendings, may add a column that the file does not have, and may leave the row bad', async () => {
    const { id, items: [row] } = await upload('epoch,theta_deg,rho_arcsec\nx,y,1.2\n')
    await mendRow(pair.observer.ctx, { batchId: id, rowId: row!.id, cells: { epoch: '2020.1' } })
    const half = await mendRow(pair.observer.ctx, { batchId: id, rowId: row!.id, cells: { observer: 'T. Orrowin' } })
    expect(half.items[0]).toMatchObject({ state: 'bad', cells: { epoch: '2020.1', theta_deg: 'y', observer: 'T. Orrowin' } })
    expect(half.items[0]!.problems.map(problem => problem.column)).toEqual(['theta_deg'])
  })

  it('takes a decimal comma, as people write', async () => {
    const { id, items: [row] } = await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,x\n')
    expect((await mendRow(pair.observer.ctx, { batchId: id, rowId: row!.id, cells: { rho_arcsec: '1,25' } })).items[0]!.state).toBe('good')
  })

  it('lets a repeated row count again when the row before it becomes another measure', async () => {
    const { id, items: [first] } = await upload('epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n2020.1,40,1.2\n')
    const mended = await mendRow(pair.observer.ctx, { batchId: id, rowId: first!.id, cells: { theta_deg: '41' } })
    expect(mended.items.map(row => row.state)).toEqual(['good', 'good'])
  })

  it('refuses a column that is none, a row that was sent and everybody but the owner, and writes nothing then', async () => {
    const { id, items: [row] } = await upload(FILE)
    const mend = (ctx = pair.observer.ctx, cells: Record<string, string> = { rho_arcsec: '1.3' }) => mendRow(ctx, { batchId: id, rowId: row!.id, cells })
    const before = await countRows(house)
    await expect(mend(pair.observer.ctx, { rhoarcsec: '1' })).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'cells.rhoarcsec' }] })
    expect(await countRows(house)).toEqual(before)
    for (const ctx of await others()) await expect(mend(ctx)).rejects.toMatchObject({ code: 'not-found' })
    await sendBatch(pair.observer.ctx, id)
    await expect(mend()).rejects.toMatchObject({ code: 'wrong-state' })
    expect((await readBatch(pair.observer.ctx, id)).items[0]!.cells.rho_arcsec).toBe('1.20')
    expect(await auditOf(house, 'batch.row-mended')).toEqual([])
  })
})

describe('choosing the target of a file', () => {
  it('gives the rows that name none their target, and moves the draft', async () => {
    const { id } = await upload(FILE, null)
    const chosen = await chooseTarget(pair.observer.ctx, { batchId: id, targetId: pair.target.id })
    expect(chosen).toMatchObject({ good: 2, bad: 0, defaultTarget: { name: 'Linden 12 AB' }, parts: [{ targetId: pair.target.id, state: 'draft', measures: 2 }] })
    const other = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 7 AB' })
    expect((await chooseTarget(pair.observer.ctx, { batchId: id, targetId: other.id })).parts.map(part => part.targetName)).toEqual(['Linden 7 AB'])
    expect(await auditOf(house, 'batch.target-chosen')).toHaveLength(2)
  })

  it('leaves rows alone that name a target, and finds one that was made meanwhile', async () => {
    const { id } = await upload('target,epoch,theta_deg,rho_arcsec\nLinden 7 AB,2020.1,40,1.2\n,2021.1,42,1.2\n', null)
    await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Linden 7 AB' })
    const chosen = await chooseTarget(pair.observer.ctx, { batchId: id, targetId: pair.target.id })
    expect(chosen.items.map(row => row.targetName)).toEqual(['Linden 7 AB', 'Linden 12 AB'])
    expect(chosen.good).toBe(2)
  })

  it('refuses a target that is not there or of another kind, and everybody but the owner', async () => {
    const { id } = await upload(FILE, null)
    const sun = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'plane', name: 'Sun of 2026' })
    for (const targetId of ['a'.repeat(26), sun.id]) {
      await expect(chooseTarget(pair.observer.ctx, { batchId: id, targetId })).rejects.toMatchObject({ code: 'input-invalid', fields: [{ path: 'targetId' }] })
    }
    for (const ctx of await others()) await expect(chooseTarget(ctx, { batchId: id, targetId: pair.target.id })).rejects.toMatchObject({ code: 'not-found' })
    expect((await readBatch(pair.observer.ctx, id))).toMatchObject({ version: 1, defaultTarget: null })
  })
})

describe('throwing a draft away', () => {
  it('takes it from every list, keeps the file and records it', async () => {
    const { id } = await upload(FILE)
    await discardBatch(pair.observer.ctx, id)
    await expect(readBatch(pair.observer.ctx, id)).rejects.toMatchObject({ code: 'not-found' })
    expect((await listBatches(pair.observer.ctx, { isMineOnly: true })).items).toEqual([])
    expect(await countRows(house)).toMatchObject({ raw_file: 1 })
    expect(await auditOf(house, 'batch.discarded')).toMatchObject([{ subject_id: id, detail: { number: 1 } }])
  })

  it('is refused once something of it was sent, and to everybody but the owner', async () => {
    const { id } = await upload(FILE)
    for (const ctx of await others()) await expect(discardBatch(ctx, id)).rejects.toMatchObject({ code: 'not-found' })
    await sendBatch(pair.observer.ctx, id)
    await expect(discardBatch(pair.observer.ctx, id)).rejects.toMatchObject({ code: 'wrong-state' })
    expect(await auditOf(house, 'batch.discarded')).toEqual([])
  })
})

describe('the list of batches', () => {
  it('holds one’s own, for coordinators also what was sent to their programmes, page by page', async () => {
    const first = await upload(FILE)
    await upload('epoch,theta_deg,rho_arcsec\n2022.1,45,1.1\n')
    await sendBatch(pair.observer.ctx, first.id)
    const mine = await listBatches(pair.observer.ctx, { isMineOnly: false, limit: 1 })
    expect(mine.items).toMatchObject([{ number: 2, good: 1, parts: [{ state: 'draft' }] }])
    expect((await listBatches(pair.observer.ctx, { isMineOnly: false, limit: 1, cursor: mine.nextCursor! })).items).toMatchObject([{ number: 1, sent: 2, parts: [{ state: 'sent', measures: 2 }] }])
    expect((await listBatches(pair.coordinator.ctx, { isMineOnly: false })).items.map(batch => batch.number)).toEqual([1])
    expect((await listBatches(pair.coordinator.ctx, { isMineOnly: true })).items).toEqual([])
    expect((await listBatches(pair.member.ctx, { isMineOnly: false })).items).toEqual([])
    await expect(listBatches(house.ctx, { isMineOnly: false })).rejects.toMatchObject({ code: 'sign-in-required' })
  })
})
