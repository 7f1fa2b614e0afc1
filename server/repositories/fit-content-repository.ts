import { sql } from 'kysely'
import type { Selectable } from 'kysely'
import type { FitMeasureTable } from '../db/schema'
import type { Reads, Tx } from './connection'
import type { NewFitMeasure } from './fit-repository'
import { readInPages } from './in-pages'
import { insertMany } from './insert-many'

export type FitMeasureRecord = Selectable<FitMeasureTable> & { decided_by_name: string | null }
export interface FitBatchRecord {
  batch_target_id: string
  id: string
  number: number
  file_name: string
  owner_id: string
  owner_name: string
  state: string
}

export async function insertFitMeasures(tx: Tx, rows: Iterable<NewFitMeasure>): Promise<void> {
  await insertMany(tx, 'fit_measure', rows)
}

export async function insertFitParts(tx: Tx, fitId: string, partIds: readonly string[]): Promise<void> {
  if (partIds.length === 0) return
  await tx.insertInto('fit_batch_target').values(partIds.map(batch_target_id => ({ fit_id: fitId, batch_target_id }))).execute()
}

export async function listFitMeasures(reads: Reads, fitId: string): Promise<FitMeasureRecord[]> {
  return readInPages<FitMeasureRecord, string>(
    ({ after, limit }) => reads
      .selectFrom('fit_measure')
      .leftJoin('person', 'person.id', 'fit_measure.decided_by')
      .selectAll('fit_measure')
      .select('person.display_name as decided_by_name')
      .where('fit_measure.fit_id', '=', fitId)
      .where('fit_measure.measure_id', '>', after ?? '')
      .orderBy('fit_measure.measure_id')
      .limit(limit)
      .execute(),
    row => row.measure_id,
  )
}

/** Written out, since the index of new measures serves no parameter. */
const IS_NEW = sql<boolean>`fit_measure.is_new = 1`

/** Measures that a fit brought in: those not in the accepted fit before it. */
export async function listNewMeasureIds(reads: Reads, fitId: string): Promise<string[]> {
  const rows = await reads.selectFrom('fit_measure').select('measure_id').where('fit_id', '=', fitId).where(IS_NEW).execute()
  return rows.map(row => row.measure_id)
}

/** Measures of a target that take part in any fit that was accepted. */
export async function listAcceptedMeasureIds(reads: Reads, targetId: string): Promise<Set<string>> {
  const rows = await reads
    .selectFrom('fit_measure')
    .innerJoin('fit', 'fit.id', 'fit_measure.fit_id')
    .select('fit_measure.measure_id')
    .distinct()
    .where('fit.target_id', '=', targetId)
    .where('fit.state', 'in', ['accepted', 'published'])
    .execute()
  return new Set(rows.map(row => row.measure_id))
}

/** The batches whose parts wait on this fit or were settled with it. */
export async function listFitBatches(reads: Reads, fitId: string): Promise<FitBatchRecord[]> {
  return reads
    .selectFrom('fit_batch_target')
    .innerJoin('batch_target', 'batch_target.id', 'fit_batch_target.batch_target_id')
    .innerJoin('batch', 'batch.id', 'batch_target.batch_id')
    .innerJoin('person', 'person.id', 'batch.owner_id')
    .select(['fit_batch_target.batch_target_id', 'batch.id', 'batch.number', 'batch.file_name', 'batch.owner_id', 'batch_target.state'])
    .select('person.display_name as owner_name')
    .where('fit_batch_target.fit_id', '=', fitId)
    .orderBy('batch.number')
    .execute()
}

/** Names of those credited with the new measures of a fit, those with most first. */
export async function listNewMeasureObservers(reads: Reads, fitIds: readonly string[]): Promise<{ fit_id: string; name: string }[]> {
  return reads
    .selectFrom('fit_measure')
    .innerJoin('measure_observer', 'measure_observer.measure_id', 'fit_measure.measure_id')
    .innerJoin('observer', 'observer.id', 'measure_observer.observer_id')
    .select(['fit_measure.fit_id', 'observer.name'])
    .where(IS_NEW)
    .where(sql<boolean>`fit_measure.fit_id IN (SELECT value FROM json_each(${JSON.stringify(fitIds)}))`)
    .groupBy(['fit_measure.fit_id', 'observer.id'])
    .orderBy(sql`count(*)`, 'desc')
    .orderBy('observer.name')
    .execute()
}
