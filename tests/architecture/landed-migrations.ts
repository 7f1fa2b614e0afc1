/**
 * SHA-256 of every migration that has landed, by file. A landed migration is never edited: databases exist that ran it.
 * A change of the tables is a new file and a new line here.
 */
export const LANDED_MIGRATIONS: Record<string, string> = {
  'server/db/migrations/2026-12-01T0900_create_tables.ts': '1d78858ecb8411e58d5ea0841068e768c7c14ad11a0c6f46e76eb3362ac195bb',
}
