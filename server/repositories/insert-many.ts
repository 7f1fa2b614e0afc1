import { CompiledQuery } from 'kysely'
import type { Insertable } from 'kysely'
import type { Database } from '../db/schema'
import type { Tx } from './connection'

/** Most values that one statement takes in SQLite. */
const VALUES_A_STATEMENT = 32_766
const ROWS_A_STATEMENT = 500

/**
 * Inserts any number of rows that name the same columns. The statement is written out here: the query builder makes an object of
 * each of a million values, which takes ten times as long. Between statements other work gets its turn, so that a file of fifty
 * thousand rows does not hold up everybody's pages.
 */
export async function insertMany<Table extends keyof Database & string>(tx: Tx, table: Table, rows: readonly Insertable<Database[Table]>[]): Promise<void> {
  const columns = Object.keys(rows[0] ?? {}) as (keyof Insertable<Database[Table]> & string)[]
  const size = Math.min(ROWS_A_STATEMENT, Math.floor(VALUES_A_STATEMENT / Math.max(1, columns.length)))
  for (let start = 0; start < rows.length; start += size) {
    const part = rows.slice(start, start + size)
    await tx.executeQuery(CompiledQuery.raw(statement(table, columns, part.length), part.flatMap(row => valuesOf(row, columns))))
    if (start + size < rows.length) await turn()
  }
}

function statement(table: string, columns: readonly string[], count: number): string {
  const row = `(${columns.map(() => '?').join(', ')})`
  return `INSERT INTO "${table}" (${columns.map(column => `"${column}"`).join(', ')}) VALUES ${Array.from({ length: count }, () => row).join(', ')}`
}

function valuesOf<Row extends object>(row: Row, columns: readonly (keyof Row)[]): unknown[] {
  if (Object.keys(row).length !== columns.length) throw new TypeError('rows that are inserted together must name the same columns')
  return columns.map((column) => {
    const value = row[column]
    if (value === undefined) throw new TypeError(`a row that is inserted names no ${String(column)}; give null where there is no value`)
    return value
  })
}

function turn(): Promise<void> {
  return new Promise(resolve => setImmediate(resolve))
}
