import { sql } from 'kysely'
import type { Insertable, Selectable } from 'kysely'
import type { Kind } from '../../fitting/types'
import type { EditionTable } from '../db/schema'
import { notFound } from '../errors/app-error'
import type { Reads, Tx } from './connection'

/** An edition without its snapshot, which may be large, with the names that lists show beside it. */
export type EditionRecord = Omit<Selectable<EditionTable>, 'snapshot'> & {
  target_name: string
  kind: Kind
  programme_id: string
  programme_name: string
  publisher_name: string
}

export interface EditionFilter {
  kind?: Kind
  /** Part of a name, already in the form names are compared in. */
  nameKeyPart?: string
  after?: { publishedAt: string; id: string }
  limit: number
}

const COLUMNS = [
  'edition.id', 'edition.target_id', 'edition.number', 'edition.fit_id', 'edition.state', 'edition.version', 'edition.sha256', 'edition.summary',
  'edition.what_changed', 'edition.published_by', 'edition.published_at', 'edition.withdrawn_at', 'edition.withdrawn_by', 'edition.withdrawal_reason',
] as const

function editions(reads: Reads) {
  return reads
    .selectFrom('edition')
    .innerJoin('target', 'target.id', 'edition.target_id')
    .innerJoin('programme', 'programme.id', 'target.programme_id')
    .innerJoin('person', 'person.id', 'edition.published_by')
    .select(COLUMNS)
    .select(['target.name as target_name', 'target.kind', 'programme.id as programme_id', 'programme.name as programme_name'])
    .select('person.display_name as publisher_name')
}

export async function insertEdition(tx: Tx, row: Insertable<EditionTable>): Promise<void> {
  await tx.insertInto('edition').values(row).execute()
}

export async function nextEditionNumber(tx: Tx, targetId: string): Promise<number> {
  const row = await tx.selectFrom('edition').select(({ fn }) => fn.max('number').as('last')).where('target_id', '=', targetId).executeTakeFirst()
  return (row?.last ?? 0) + 1
}

export async function getEdition(reads: Reads, targetId: string, number: number): Promise<EditionRecord> {
  const row = await editions(reads).where('edition.target_id', '=', targetId).where('edition.number', '=', number).executeTakeFirst()
  if (!row) throw notFound()
  return row
}

/** The edition in force; there is one at most. */
export async function findCurrentEdition(reads: Reads, targetId: string): Promise<EditionRecord | undefined> {
  return editions(reads).where('edition.target_id', '=', targetId).where('edition.state', '=', 'published').executeTakeFirst()
}

/** All editions of a target, the newest first. */
export async function listEditionsOfTarget(reads: Reads, targetId: string): Promise<EditionRecord[]> {
  return editions(reads).where('edition.target_id', '=', targetId).orderBy('edition.number', 'desc').execute()
}

/** Editions in force, the newest first. */
export async function listCurrentEditions(reads: Reads, filter: EditionFilter): Promise<EditionRecord[]> {
  let query = editions(reads).where('edition.state', '=', 'published')
  if (filter.kind) query = query.where('target.kind', '=', filter.kind)
  if (filter.nameKeyPart) {
    query = query.where(sql<boolean>`EXISTS (SELECT 1 FROM target_name n WHERE n.target_id = target.id AND instr(n.name_key, ${filter.nameKeyPart}) > 0)`)
  }
  if (filter.after) query = query.where(sql<boolean>`(edition.published_at, edition.id) < (${filter.after.publishedAt}, ${filter.after.id})`)
  return query.orderBy('edition.published_at', 'desc').orderBy('edition.id', 'desc').limit(filter.limit).execute()
}

/** The canonical bytes as they were sealed. */
export async function getSnapshotText(reads: Reads, editionId: string): Promise<string> {
  const row = await reads.selectFrom('edition').select('snapshot').where('id', '=', editionId).executeTakeFirst()
  if (!row) throw notFound()
  return row.snapshot
}

/** Changes an edition that still stands published in the version that was seen; false where it has moved on. */
export async function updatePublishedEdition(tx: Tx, edition: { id: string; version: number }, change: Partial<Selectable<EditionTable>>): Promise<boolean> {
  const outcome = await tx
    .updateTable('edition')
    .set({ ...change, version: edition.version + 1 })
    .where('id', '=', edition.id)
    .where('version', '=', edition.version)
    .where('state', '=', 'published')
    .executeTakeFirst()
  return outcome.numUpdatedRows === 1n
}
