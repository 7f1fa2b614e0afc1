import { sql } from 'kysely'
import type { Insertable, Selectable } from 'kysely'
import type { MeasureTable } from '../db/schema'
import type { Reads, Tx } from './connection'
import { inParts, readInPages } from './in-pages'
import { insertMany } from './insert-many'

export type NewMeasure = Insertable<MeasureTable>
export type MeasureRecord = Selectable<MeasureTable> & { observer_name: string; batch_number: number }

export async function insertMeasures(tx: Tx, measures: Iterable<NewMeasure>): Promise<void> {
  await insertMany(tx, 'measure', measures)
}

export async function insertMeasureObservers(tx: Tx, rows: Iterable<{ measure_id: string; observer_id: string }>): Promise<void> {
  await insertMany(tx, 'measure_observer', rows)
}

function measures(reads: Reads) {
  return reads
    .selectFrom('measure')
    .innerJoin('batch', 'batch.id', 'measure.batch_id')
    .selectAll('measure')
    .select('batch.number as batch_number')
    .select(sql<string>`(SELECT group_concat(o.name, ', ' ORDER BY mo.position, o.name) FROM measure_observer mo
      JOIN observer o ON o.id = mo.observer_id WHERE mo.measure_id = measure.id)`.as('observer_name'))
}

/**
 * Standing measures of a target: those of accepted batches and those that were sent and wait. A measure stops standing when
 * it is superseded, by its correction or because its batch was returned, declined or withdrawn.
 */
export async function listStandingMeasures(reads: Reads, targetId: string): Promise<MeasureRecord[]> {
  const standing = await readInPages<MeasureRecord, string>(
    ({ after, limit }) => measures(reads)
      .where('measure.target_id', '=', targetId)
      .where('measure.superseded_at', 'is', null)
      .where('measure.duplicate_key', '>', after ?? '') // unique among those that stand, and indexed with the target
      .orderBy('measure.duplicate_key')
      .limit(limit)
      .execute(),
    measure => measure.duplicate_key,
  )
  return standing.sort(byTime)
}

/** In the order in which measures are fitted and shown: by epoch, where none is known by direction, alike ones by id. */
function byTime(a: MeasureRecord, b: MeasureRecord): number {
  return compare(a.epoch_yr, b.epoch_yr) || compare(a.phi_deg, b.phi_deg) || (a.id < b.id ? -1 : 1)
}

/** What is not known comes first. */
function compare(a: number | null, b: number | null): number {
  return (a ?? -Infinity) === (b ?? -Infinity) ? 0 : (a ?? -Infinity) - (b ?? -Infinity)
}

export async function listStandingMeasureIds(reads: Reads, targetId: string): Promise<string[]> {
  const rows = await reads.selectFrom('measure').select('id').where('target_id', '=', targetId).where('superseded_at', 'is', null).execute()
  return rows.map(row => row.id)
}

export async function listMeasuresByIds(reads: Reads, ids: readonly string[]): Promise<MeasureRecord[]> {
  const found = await inParts(ids, part => measures(reads).where(sql<boolean>`measure.id IN (SELECT value FROM json_each(${JSON.stringify(part)}))`).execute())
  return found.sort(byTime)
}

/** Standing measures that one batch brought to one target. */
export async function listStandingMeasuresOfPart(reads: Reads, batchId: string, targetId: string): Promise<{ id: string; batch_row_id: string }[]> {
  return reads
    .selectFrom('measure')
    .select(['id', 'batch_row_id'])
    .where('batch_id', '=', batchId)
    .where('target_id', '=', targetId)
    .where('superseded_at', 'is', null)
    .execute()
}

/** Which of these keys a standing measure of the target already has. */
export async function listKnownDuplicateKeys(reads: Reads, targetId: string, keys: readonly string[]): Promise<Set<string>> {
  const rows = await inParts(keys, part => reads
    .selectFrom('measure')
    .select('duplicate_key')
    .where('target_id', '=', targetId)
    .where('superseded_at', 'is', null)
    .where(sql<boolean>`duplicate_key IN (SELECT value FROM json_each(${JSON.stringify(part)}))`)
    .execute())
  return new Set(rows.map(row => row.duplicate_key))
}

export async function markMeasuresSuperseded(tx: Tx, ids: readonly string[], at: string): Promise<void> {
  await inParts(ids, part => tx
    .updateTable('measure')
    .set({ superseded_at: at })
    .where(sql<boolean>`id IN (SELECT value FROM json_each(${JSON.stringify(part)}))`)
    .execute())
}

/** People whose accounts are credited with any of these measures. */
export async function listCreditedPersonIds(reads: Reads, measureIds: readonly string[]): Promise<string[]> {
  const rows = await inParts(measureIds, part => reads
    .selectFrom('measure_observer')
    .innerJoin('observer', 'observer.id', 'measure_observer.observer_id')
    .select('observer.person_id')
    .distinct()
    .where(sql<boolean>`measure_observer.measure_id IN (SELECT value FROM json_each(${JSON.stringify(part)}))`)
    .where('observer.person_id', 'is not', null)
    .execute())
  return [...new Set(rows.map(row => row.person_id!))].sort()
}
