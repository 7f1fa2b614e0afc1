import { sql } from 'kysely'
import type { Kysely } from 'kysely'

/** What a fit says in one line stands beside its result, which may hold megabytes and need not be read for a list. */
const STATEMENTS = [
  `ALTER TABLE fit ADD COLUMN headline TEXT`,
  `UPDATE fit SET headline = coalesce(result ->> '$.conic.statement', result ->> '$.stop.sentence', refusal ->> '$.sentence')`,
]

export async function up(db: Kysely<unknown>): Promise<void> {
  for (const statement of STATEMENTS) await sql.raw(statement).execute(db)
}
