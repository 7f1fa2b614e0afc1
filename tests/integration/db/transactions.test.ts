import { afterEach, beforeEach, expect, test } from 'vitest'
import Sqlite from 'better-sqlite3'
import { sql } from 'kysely'
import { withTransaction } from '../../../server/context/context'
import { recordAudit } from '../../../server/audit/record-audit'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
beforeEach(async () => { house = await createTestHouse() })
afterEach(async () => { await house.close() })

const event = { event: 'follow.started', subjectKind: 'target', subjectId: 'a'.repeat(26), detail: {} } as const
const countEvents = async () => (await house.ctx.reads.selectFrom('audit_event').selectAll().execute()).length

test('the outer write handle throws inside its own transaction instead of waiting for ever', async () => {
  await expect(withTransaction(house.ctx, async () => {
    await house.ctx.db.selectFrom('person').selectAll().execute()
  })).rejects.toThrow(/outer database handle inside a transaction/)
})

test('the read connection throws inside a transaction, where it would not see the writes made so far', async () => {
  await expect(withTransaction(house.ctx, async () => {
    await house.ctx.reads.selectFrom('person').selectAll().execute()
  })).rejects.toThrow(/outer database handle inside a transaction/)
})

test('a transaction inside a transaction throws', async () => {
  await expect(withTransaction(house.ctx, () => withTransaction(house.ctx, async () => 1))).rejects.toThrow(/inside a transaction/)
})

test('what a failed transaction wrote is gone, and its after-commit actions do not run', async () => {
  let hasRun = false
  await expect(withTransaction(house.ctx, async (tx) => {
    await recordAudit(tx, house.ctx, event)
    house.ctx.afterCommit(() => { hasRun = true })
    throw new Error('changed my mind')
  })).rejects.toThrow('changed my mind')
  expect(await countEvents()).toBe(0)
  expect(hasRun).toBe(false)
})

test('an after-commit action runs once the writes can be seen, and may use the handles again', async () => {
  const seen: Promise<number>[] = []
  await withTransaction(house.ctx, async (tx) => {
    await recordAudit(tx, house.ctx, event)
    house.ctx.afterCommit(() => { seen.push(countEvents()) })
  })
  expect(await Promise.all(seen)).toEqual([1])
})

test('an after-commit action outside a transaction is refused', () => {
  expect(() => house.ctx.afterCommit(() => {})).toThrow(/outside a transaction/)
})

test('two transactions at once wait for each other and both count', async () => {
  await Promise.all([1, 2, 3].map(() => withTransaction(house.ctx, async (tx) => {
    await tx.selectFrom('audit_event').selectAll().execute()
    await recordAudit(tx, house.ctx, event)
  })))
  expect(await countEvents()).toBe(3)
})

test('a transaction holds the write lock before its first write, so read-then-write cannot fail half-way', async () => {
  const other = new Sqlite(house.databaseFile, { timeout: 0 })
  await withTransaction(house.ctx, async (tx) => {
    await tx.selectFrom('audit_event').selectAll().execute()
    expect(() => other.exec('BEGIN IMMEDIATE')).toThrow(/locked/)
  })
  expect(() => other.exec('BEGIN IMMEDIATE')).not.toThrow()
  other.close()
})

test('the read connection refuses to write', async () => {
  await expect(house.ctx.reads.insertInto('programme').values({ id: 'b'.repeat(26), name: 'n', created_at: house.clock.now() }).execute()).rejects.toThrow(/readonly/)
})

test('the connections run with the pragmas that durability and the keys need', async () => {
  const pragma = async (name: string) => Object.values((await sql.raw(`PRAGMA ${name}`).execute(house.ctx.db)).rows[0] as object)[0]
  expect(await pragma('journal_mode')).toBe('wal')
  expect(await pragma('synchronous')).toBe(2)
  expect(await pragma('foreign_keys')).toBe(1)
  expect(await pragma('busy_timeout')).toBe(5000)
})
