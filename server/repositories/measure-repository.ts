import { sql } from 'kysely'
import type { Insertable, Selectable } from 'kysely'
import type { MeasureTable } from '../db/schema'
import type { Reads, Tx } from './connection'
import { insertMany } from './insert-many'

export type NewMeasure = Insertable<MeasureTable>
export type MeasureRecord = Selectable<MeasureTable> & { observer_name: string; batch_number: number }

export async function insertMeasures(tx: Tx, measures: readonly NewMeasure[]): Promise<void> {
  await insertMany(tx, 'measure', measures)
}

export async function insertMeasureObservers(tx: Tx, rows: readonly { measure_id: string; observer_id: string }[]): Promise<void> {
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
  return measures(reads)
    .where('measure.target_id', '=', targetId)
    .where('measure.superseded_at', 'is', null)
    .orderBy('measure.epoch_yr')
    .orderBy('measure.phi_deg')
    .orderBy('measure.id')
    .execute()
}

export async function listMeasuresByIds(reads: Reads, ids: readonly string[]): Promise<MeasureRecord[]> {
  if (ids.length === 0) return []
  return measures(reads)
    .where(sql<boolean>`measure.id IN (SELECT value FROM json_each(${JSON.stringify(ids)}))`)
    .orderBy('measure.epoch_yr')
    .orderBy('measure.phi_deg')
    .orderBy('measure.id')
    .execute()
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
  if (keys.length === 0) return new Set()
  const rows = await reads
    .selectFrom('measure')
    .select('duplicate_key')
    .where('target_id', '=', targetId)
    .where('superseded_at', 'is', null)
    .where(sql<boolean>`duplicate_key IN (SELECT value FROM json_each(${JSON.stringify(keys)}))`)
    .execute()
  return new Set(rows.map(row => row.duplicate_key))
}

export async function markMeasuresSuperseded(tx: Tx, ids: readonly string[], at: string): Promise<void> {
  await tx
    .updateTable('measure')
    .set({ superseded_at: at })
    .where(sql<boolean>`id IN (SELECT value FROM json_each(${JSON.stringify(ids)}))`)
    .execute()
}

/** People whose accounts are credited with any of these measures. */
export async function listCreditedPersonIds(reads: Reads, measureIds: readonly string[]): Promise<string[]> {
  const rows = await reads
    .selectFrom('measure_observer')
    .innerJoin('observer', 'observer.id', 'measure_observer.observer_id')
    .select('observer.person_id')
    .distinct()
    .where(sql<boolean>`measure_observer.measure_id IN (SELECT value FROM json_each(${JSON.stringify(measureIds)}))`)
    .where('observer.person_id', 'is not', null)
    .orderBy('observer.person_id')
    .execute()
  return rows.map(row => row.person_id!)
}
