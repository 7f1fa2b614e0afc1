import { CompiledQuery } from 'kysely'
import type { Insertable } from 'kysely'
import { createTurns } from '../../shared/turns/turns'
import type { Database } from '../db/schema'
import type { Tx } from './connection'

/** Enough that the call weighs little beside the rows; more makes a text that takes long to prepare. */
const VALUES_A_STATEMENT = 1000

/**
 * Inserts any number of rows that name the same columns, in slices between which others are answered. The statement is written
 * out here: the query builder makes an object of each of a million values, which takes ten times as long. Rows may be made while
 * they are asked for, so that they need not all be there at once.
 */
export async function insertMany<Table extends keyof Database & string>(tx: Tx, table: Table, rows: Iterable<Insertable<Database[Table]>>): Promise<void> {
  const turns = createTurns()
  let columns: (keyof Insertable<Database[Table]> & string)[] = []
  let values: unknown[] = []
  const write = async () => {
    await tx.executeQuery(CompiledQuery.raw(statement(table, columns, values.length / columns.length), values))
    values = []
    if (turns.isOver()) await turns.giveWay()
  }
  for (const row of rows) {
    if (columns.length === 0) columns = Object.keys(row) as typeof columns
    pushValues(values, row, columns)
    if (values.length + columns.length > VALUES_A_STATEMENT) await write()
  }
  if (values.length > 0) await write()
}

function statement(table: string, columns: readonly string[], count: number): string {
  const row = `(${columns.map(() => '?').join(', ')})`
  return `INSERT INTO "${table}" (${columns.map(column => `"${column}"`).join(', ')}) VALUES ${Array.from({ length: count }, () => row).join(', ')}`
}

function pushValues<Row extends object>(values: unknown[], row: Row, columns: readonly (keyof Row)[]): void {
  if (Object.keys(row).length !== columns.length) throw new TypeError('rows that are inserted together must name the same columns')
  for (const column of columns) {
    const value = row[column]
    if (value === undefined) throw new TypeError(`a row that is inserted names no ${String(column)}; give null where there is no value`)
    values.push(value)
  }
}
