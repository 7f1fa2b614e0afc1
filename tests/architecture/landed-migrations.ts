/**
 * SHA-256 of every migration that has landed, by file. A landed migration is never edited: databases exist that ran it.
 * A change of the tables is a new file and a new line here.
 */
export const LANDED_MIGRATIONS: Record<string, string> = {
  'server/db/migrations/2026-12-01T0900_create_tables.ts': '731a2dff74663f9b37bf88a1ebc65734da8c4084b023ab34321ab5a87b64b434',
  'server/db/migrations/2026-12-01T1530_index_long_lists.ts': 'cf523247ce1b67e3f994b812b97328a3bfd42deaef567ce4fbad7448c1ddd287',
  'server/db/migrations/2026-12-01T1550_add_headline.ts': 'e2940523950a69f50123e266506c408357ad1bba7b9990af02fa663fa7a33b57',
}
