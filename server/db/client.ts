import Sqlite from 'better-sqlite3'
import { Kysely, SqliteAdapter, SqliteDialect, SqliteDriver, CompiledQuery } from 'kysely'
import type { DatabaseConnection, DialectAdapter, Driver, SqliteDialectConfig, Transaction } from 'kysely'
import type { Database } from './schema'
import { withStatementCache } from './statement-cache'
import { isInTransaction } from './transaction'

export type Db = Kysely<Database>
export type Tx = Transaction<Database>
/** What a read may run on: the read-only connection, or a transaction that must see its own writes. */
export type Reads = Kysely<Database>

export interface DatabaseClient {
  /** Writes, through `transact` only. */
  db: Db
  /** A second, read-only connection: reads do not queue behind a write transaction. */
  reads: Reads
  close(): Promise<void>
}

/** How long one process waits for another's write lock, milliseconds. */
const BUSY_TIMEOUT_MS = 5000

class GuardedDriver extends SqliteDriver {
  override async acquireConnection(): Promise<DatabaseConnection> {
    if (isInTransaction()) {
      throw new Error('A query was sent to the outer database handle inside a transaction. There is one write connection, so it would wait for ever (and ctx.reads would not see the writes made so far). Use the tx that withTransaction hands over.')
    }
    return await super.acquireConnection()
  }

  // A deferred BEGIN that reads first and writes later fails at once with SQLITE_BUSY_SNAPSHOT beside a second writer.
  override async beginTransaction(connection: DatabaseConnection): Promise<void> {
    await connection.executeQuery(CompiledQuery.raw('begin immediate'))
  }
}

class TransactionalDdlAdapter extends SqliteAdapter {
  override get supportsTransactionalDdl(): boolean {
    return true // SQLite does roll back DDL; with Kysely's default a half-failed migration leaves its tables
  }
}

class AppSqliteDialect extends SqliteDialect {
  readonly #config: SqliteDialectConfig
  constructor(config: SqliteDialectConfig) {
    super(config)
    this.#config = config
  }

  override createDriver(): Driver {
    return new GuardedDriver(this.#config)
  }

  override createAdapter(): DialectAdapter {
    return new TransactionalDdlAdapter()
  }
}

/** Opens one connection as a Kysely instance with the driver, adapter and pragmas of this house. */
export function openConnection(file: string, { isReadOnly = false, foreignKeys = true } = {}): Db {
  const database = new Sqlite(file, { readonly: isReadOnly, timeout: BUSY_TIMEOUT_MS })
  if (isReadOnly) {
    database.pragma('query_only = ON')
  }
  else {
    database.pragma('journal_mode = WAL')
    database.pragma('synchronous = FULL')
    database.pragma(`foreign_keys = ${foreignKeys ? 'ON' : 'OFF'}`)
  }
  return new Kysely<Database>({ dialect: new AppSqliteDialect({ database: withStatementCache(database) }) })
}

/** Opens the write connection first, since a read-only one cannot create the file or its WAL. */
export function openDatabase(file: string): DatabaseClient {
  const db = openConnection(file)
  const reads = openConnection(file, { isReadOnly: true })
  return {
    db,
    reads,
    async close() {
      await reads.destroy()
      await db.destroy()
    },
  }
}
