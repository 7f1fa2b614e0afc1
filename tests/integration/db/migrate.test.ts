import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import Sqlite from 'better-sqlite3'
import { sql } from 'kysely'
import type { Kysely, Migration } from 'kysely'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { migrateToLatest } from '../../../server/db/migrate'
import { migrations } from '../../../server/db/migrations'

let folder: string
let file: string
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'semilatus-'))
  file = join(folder, 'semilatus.sqlite3')
})
afterEach(async () => { await rm(folder, { recursive: true }) })

function tableNames(): string[] {
  const database = new Sqlite(file)
  const rows = database.prepare(`SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'kysely%' AND name NOT LIKE 'sqlite%'`).all() as { name: string }[]
  database.close()
  return rows.map(row => row.name)
}

function statements(...texts: string[]): Migration {
  return {
    async up(db: Kysely<unknown>) {
      for (const text of texts) await sql.raw(text).execute(db)
    },
  }
}

const parentAndChild = statements(
  'CREATE TABLE parent (id INTEGER PRIMARY KEY) STRICT',
  'CREATE TABLE child (parent_id INTEGER NOT NULL REFERENCES parent (id) ON DELETE CASCADE) STRICT',
  'INSERT INTO parent VALUES (1), (2)',
  'INSERT INTO child VALUES (1), (2)',
)

test('the migrations make every table of the design, and a second run changes nothing', async () => {
  expect(await migrateToLatest(file)).toEqual(Object.keys(migrations))
  expect(tableNames()).toEqual(expect.arrayContaining(['person', 'session', 'programme', 'target', 'batch', 'measure', 'fit', 'edition', 'mail_out', 'job', 'audit_event']))
  expect(await migrateToLatest(file)).toEqual([])
})

test('a migration that fails half-way leaves none of its tables, nor those of the ones before it', async () => {
  const failing = statements('CREATE TABLE second (id INTEGER) STRICT', 'INSERT INTO nowhere VALUES (1)')
  await expect(migrateToLatest(file, { '1_parent_and_child': parentAndChild, '2_fails': failing })).rejects.toThrow(/2_fails.*nothing was changed/s)
  expect(tableNames()).toEqual([])
})

test('rebuilding a table in a migration keeps the rows that refer to it', async () => {
  const rebuild = statements('CREATE TABLE parent_new (id INTEGER PRIMARY KEY, name TEXT) STRICT', 'INSERT INTO parent_new SELECT id, NULL FROM parent', 'DROP TABLE parent', 'ALTER TABLE parent_new RENAME TO parent')
  await migrateToLatest(file, { '1_parent_and_child': parentAndChild, '2_rebuild': rebuild })
  const database = new Sqlite(file)
  expect(database.prepare('SELECT count(*) AS count FROM child').get()).toEqual({ count: 2 })
  database.close()
})

test('a migration that leaves a row without its parent is undone', async () => {
  await migrateToLatest(file, { '1_parent_and_child': parentAndChild })
  await expect(migrateToLatest(file, { '1_parent_and_child': parentAndChild, '2_orphans': statements('DELETE FROM parent WHERE id = 1') })).rejects.toThrow(/2_orphans/)
  const database = new Sqlite(file)
  expect(database.prepare('SELECT count(*) AS count FROM parent').get()).toEqual({ count: 2 })
  database.close()
})

test('fits that were there before keep what they said, as a line of their own', async () => {
  const upTo = (last: string) => Object.fromEntries(Object.entries(migrations).filter(([name]) => name <= last))
  await migrateToLatest(file, upTo('2026-12-01T1530_index_long_lists'))
  const database = new Sqlite(file)
  database.pragma('foreign_keys = OFF')
  const insert = database.prepare(`INSERT INTO fit (id, target_id, number, state, cause, request, input_hash, engine_version, seed, result, refusal, created_at)
    VALUES (?, ?, ?, 'superseded', 'refit', '{}', ?, '1', 1, ?, ?, '2026-12-01T09:00:00.000Z')`)
  database.exec(`INSERT INTO programme (id, name, created_at) VALUES ('${'p'.repeat(26)}', 'Northern pairs', '2026-12-01T09:00:00.000Z');
    INSERT INTO target (id, programme_id, kind, name, created_at) VALUES ('${'t'.repeat(26)}', '${'p'.repeat(26)}', 'relative', 'Linden 12 AB', '2026-12-01T09:00:00.000Z')`)
  const said = [
    { conic: { statement: 'Ellipse' }, stop: { sentence: 'Converged.' } },
    { conic: null, stop: { sentence: 'Converged.' } },
    null,
    null,
  ]
  for (const [i, result] of said.entries()) {
    const refusal = i === 2 ? JSON.stringify({ sentence: 'Too few measures.' }) : null
    insert.run(String.fromCharCode(97 + i).repeat(26), 't'.repeat(26), i + 1, 'f'.repeat(64), result && JSON.stringify(result), refusal)
  }
  database.close()

  expect(await migrateToLatest(file, upTo('2026-12-01T1550_add_headline'))).toEqual(['2026-12-01T1550_add_headline'])
  const after = new Sqlite(file)
  expect(after.prepare('SELECT headline FROM fit ORDER BY number').pluck().all()).toEqual(['Ellipse', 'Converged.', 'Too few measures.', null])
  after.close()
})
