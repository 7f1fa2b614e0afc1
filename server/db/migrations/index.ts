import type { Migration } from 'kysely'
import * as createTables from './2026-12-01T0900_create_tables'
import * as indexLongLists from './2026-12-01T1530_index_long_lists'
import * as addHeadline from './2026-12-01T1550_add_headline'

/** Every migration by name, in order; listed by hand since a bundle cannot read a folder. */
export const migrations: Record<string, Migration> = {
  '2026-12-01T0900_create_tables': createTables,
  '2026-12-01T1530_index_long_lists': indexLongLists,
  '2026-12-01T1550_add_headline': addHeadline,
}
