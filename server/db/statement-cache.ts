import type { SqliteDatabase, SqliteStatement } from 'kysely'

/** Statements kept ready; those not used for longest are dropped first. */
const MOST_STATEMENTS = 200
/** A longer text, such as one with a long list in it, hardly comes again as it is. */
const LONGEST_TEXT = 20_000

/** The same connection, but a statement is prepared once and not each time it is run. */
export function withStatementCache(database: SqliteDatabase): SqliteDatabase {
  const statements = new Map<string, SqliteStatement>()
  return {
    close: () => database.close(),
    prepare(sql) {
      const statement = statements.get(sql) ?? database.prepare(sql)
      if (sql.length > LONGEST_TEXT) return statement
      statements.delete(sql)
      statements.set(sql, statement)
      if (statements.size > MOST_STATEMENTS) statements.delete(statements.keys().next().value!)
      return statement
    },
  }
}
