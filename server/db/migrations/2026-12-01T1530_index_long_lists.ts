import { sql } from 'kysely'
import type { Kysely } from 'kysely'

/** What lists and sheets count of ten thousand rows is then read from an index alone. */
const STATEMENTS = [
  `CREATE INDEX batch_row_state ON batch_row (batch_id, state, target_id)`,
  `CREATE INDEX measure_standing ON measure (target_id, epoch_yr, id) WHERE superseded_at IS NULL`,
  `CREATE INDEX fit_measure_new ON fit_measure (fit_id, measure_id) WHERE is_new = 1`,
]

export async function up(db: Kysely<unknown>): Promise<void> {
  for (const statement of STATEMENTS) await sql.raw(statement).execute(db)
}
