import { Migrator, sql } from 'kysely'
import type { Kysely, Migration } from 'kysely'
import { openConnection } from './client'
import { migrations as allMigrations } from './migrations'

/**
 * Brings the file to the newest state on a connection of its own, all or nothing.
 * Foreign keys are off on that connection, since dropping a table while they are on deletes its children; every
 * migration is followed by a check of all of them before the commit.
 */
export async function migrateToLatest(file: string, migrations: Record<string, Migration> = allMigrations): Promise<string[]> {
  const db = openConnection(file, { foreignKeys: false })
  try {
    const migrator = new Migrator({ db, provider: { getMigrations: async () => withForeignKeyCheck(migrations) } })
    const { error, results } = await migrator.migrateToLatest()
    if (error) {
      const failed = results?.find(result => result.status === 'Error')?.migrationName
      throw new Error(`The database ${file} could not be brought up to date${failed ? ` (migration ${failed})` : ''}; nothing was changed.`, { cause: error })
    }
    return results?.map(result => result.migrationName) ?? []
  }
  finally {
    await db.destroy()
  }
}

function withForeignKeyCheck(migrations: Record<string, Migration>): Record<string, Migration> {
  return Object.fromEntries(Object.entries(migrations).map(([name, migration]) => [name, {
    async up(db: Kysely<unknown>) {
      await migration.up(db)
      const broken = await sql<{ table: string, parent: string }>`PRAGMA foreign_key_check`.execute(db)
      if (broken.rows.length > 0) {
        const first = broken.rows[0]!
        throw new Error(`${name} leaves ${broken.rows.length} rows without their parent, the first in ${first.table} (parent ${first.parent}).`)
      }
    },
  }]))
}
