import Sqlite from 'better-sqlite3'
import { describe, expect, it } from 'vitest'
import { withStatementCache } from '../../../../server/db/statement-cache'

/** A real database, and the texts that it was asked to prepare. */
function watched() {
  const database = new Sqlite(':memory:')
  database.exec('CREATE TABLE pair (name TEXT) STRICT')
  const prepared: string[] = []
  const connection = withStatementCache({
    close: () => void database.close(),
    prepare(sql) {
      prepared.push(sql)
      return database.prepare(sql)
    },
  })
  return { connection, prepared }
}

describe('a connection that keeps its statements', () => {
  it('prepares the same text once and runs it with the values of each time', () => {
    const { connection, prepared } = watched()
    for (const name of ['Linden 12', 'Linden 13']) connection.prepare('INSERT INTO pair VALUES (?)').run([name])
    for (const name of ['Linden 13', 'Linden 12']) {
      expect(connection.prepare('SELECT name FROM pair WHERE name = ?').all([name])).toEqual([{ name }])
    }
    expect(prepared).toEqual(['INSERT INTO pair VALUES (?)', 'SELECT name FROM pair WHERE name = ?'])
    connection.close()
  })

  it('forgets what was not used for longest, and never keeps a very long text', () => {
    const { connection, prepared } = watched()
    const text = (i: number) => `SELECT ${i}`
    for (let i = 0; i < 201; i++) connection.prepare(text(i))
    connection.prepare(text(200))
    connection.prepare(text(0))
    expect(prepared.filter(sql => sql === text(200))).toHaveLength(1)
    expect(prepared.filter(sql => sql === text(0))).toHaveLength(2)
    const long = `SELECT '${'x'.repeat(20_000)}'`
    expect([connection.prepare(long).all([]), connection.prepare(long).all([])].map(rows => rows.length)).toEqual([1, 1])
    expect(prepared.filter(sql => sql === long)).toHaveLength(2)
    connection.close()
  })
})
