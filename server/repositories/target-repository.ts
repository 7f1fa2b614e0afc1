import { sql } from 'kysely'
import type { Insertable, Selectable } from 'kysely'
import type { TargetTable } from '../db/schema'
import { notFound } from '../errors/app-error'
import type { Kind } from '../../fitting/types'
import type { Reads, Tx } from './connection'

export type TargetRow = Selectable<TargetTable> & { programme_name: string }

/** One line of the list of targets, with what is known about its standing measures. */
export interface TargetOverviewRow extends TargetRow {
  measures: number
  observers: number
  first_epoch_yr: number | null
  last_epoch_yr: number | null
  edition_number: number | null
  edition_published_at: string | null
}

export interface TargetFilter {
  programmeId?: string
  kind?: Kind
  /** Part of a name, already in the form names are compared in. */
  nameKeyPart?: string
  /** Only those that this person follows. */
  followedBy?: string
  after?: { name: string; id: string }
  limit: number
}

export async function insertTarget(tx: Tx, row: Insertable<TargetTable>): Promise<void> {
  await tx.insertInto('target').values(row).execute()
}

export async function insertTargetName(tx: Tx, row: { id: string; target_id: string; name: string; name_key: string }): Promise<void> {
  await tx.insertInto('target_name').values(row).execute()
}

export async function findTarget(reads: Reads, id: string): Promise<TargetRow | undefined> {
  return reads
    .selectFrom('target')
    .innerJoin('programme', 'programme.id', 'target.programme_id')
    .selectAll('target')
    .select('programme.name as programme_name')
    .where('target.id', '=', id)
    .executeTakeFirst()
}

export async function getTarget(reads: Reads, id: string): Promise<TargetRow> {
  const row = await findTarget(reads, id)
  if (!row) throw notFound()
  return row
}

export async function listTargetsByIds(reads: Reads, ids: readonly string[]): Promise<TargetRow[]> {
  if (ids.length === 0) return []
  return reads
    .selectFrom('target')
    .innerJoin('programme', 'programme.id', 'target.programme_id')
    .selectAll('target')
    .select('programme.name as programme_name')
    .where(sql<boolean>`target.id IN (SELECT value FROM json_each(${JSON.stringify(ids)}))`)
    .execute()
}

/** Targets by any of their names, keyed by the form names are compared in. */
export async function mapTargetsByNameKey(reads: Reads, nameKeys: readonly string[]): Promise<Map<string, { id: string; name: string; kind: Kind }>> {
  if (nameKeys.length === 0) return new Map()
  const rows = await reads
    .selectFrom('target_name')
    .innerJoin('target', 'target.id', 'target_name.target_id')
    .select(['target_name.name_key', 'target.id', 'target.name', 'target.kind'])
    .where(sql<boolean>`target_name.name_key IN (SELECT value FROM json_each(${JSON.stringify(nameKeys)}))`)
    .execute()
  return new Map(rows.map(row => [row.name_key, { id: row.id, name: row.name, kind: row.kind }]))
}

export async function listTargetNames(reads: Reads, targetId: string): Promise<string[]> {
  const rows = await reads.selectFrom('target_name').select('name').where('target_id', '=', targetId).orderBy('name').execute()
  return rows.map(row => row.name)
}

function overview(reads: Reads) {
  return reads
    .selectFrom('target')
    .innerJoin('programme', 'programme.id', 'target.programme_id')
    .leftJoin('edition', join => join.onRef('edition.target_id', '=', 'target.id').on('edition.state', '=', 'published'))
    .selectAll('target')
    .select(['programme.name as programme_name', 'edition.number as edition_number', 'edition.published_at as edition_published_at'])
    .select([
      sql<number>`(SELECT count(*) FROM measure m WHERE m.target_id = target.id AND m.superseded_at IS NULL)`.as('measures'),
      sql<number>`(SELECT count(DISTINCT o.observer_id) FROM measure m JOIN measure_observer o ON o.measure_id = m.id
        WHERE m.target_id = target.id AND m.superseded_at IS NULL)`.as('observers'),
      sql<number | null>`(SELECT min(m.epoch_yr) FROM measure m WHERE m.target_id = target.id AND m.superseded_at IS NULL)`.as('first_epoch_yr'),
      sql<number | null>`(SELECT max(m.epoch_yr) FROM measure m WHERE m.target_id = target.id AND m.superseded_at IS NULL)`.as('last_epoch_yr'),
    ])
}

export async function findTargetOverview(reads: Reads, id: string): Promise<TargetOverviewRow | undefined> {
  return overview(reads).where('target.id', '=', id).executeTakeFirst()
}

export async function listTargetOverviews(reads: Reads, filter: TargetFilter): Promise<TargetOverviewRow[]> {
  let query = overview(reads)
  if (filter.programmeId) query = query.where('target.programme_id', '=', filter.programmeId)
  if (filter.kind) query = query.where('target.kind', '=', filter.kind)
  if (filter.nameKeyPart) {
    query = query.where(sql<boolean>`EXISTS (SELECT 1 FROM target_name n WHERE n.target_id = target.id AND instr(n.name_key, ${filter.nameKeyPart}) > 0)`)
  }
  if (filter.followedBy) query = query.where(sql<boolean>`EXISTS (SELECT 1 FROM follow f WHERE f.target_id = target.id AND f.person_id = ${filter.followedBy})`)
  if (filter.after) query = query.where(sql<boolean>`(target.name, target.id) > (${filter.after.name}, ${filter.after.id})`)
  return query.orderBy('target.name').orderBy('target.id').limit(filter.limit).execute()
}
