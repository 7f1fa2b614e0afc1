import { sql } from 'kysely'
import type { Insertable, Selectable, Updateable } from 'kysely'
import type { FitMeasureTable, FitTable } from '../db/schema'
import { notFound } from '../errors/app-error'
import type { Reads, Tx } from './connection'

export type FitRecord = Selectable<FitTable> & { requested_by_name: string | null; new_measures: number }
/** A fit as lists need it: without its request and its result, which may hold megabytes. */
export type FitLine = Omit<FitRecord, 'request' | 'result'>
export type NewFitMeasure = Insertable<FitMeasureTable>
export type FitStateName = FitTable['state']

const LINE_COLUMNS = [
  'fit.id', 'fit.target_id', 'fit.number', 'fit.state', 'fit.version', 'fit.requested_by', 'fit.cause', 'fit.input_hash', 'fit.engine_version',
  'fit.seed', 'fit.base_fit_id', 'fit.refusal', 'fit.created_at', 'fit.finished_at', 'fit.headline',
] as const

function fits(reads: Reads) {
  return fitLines(reads).select(['fit.request', 'fit.result'])
}

function fitLines(reads: Reads) {
  return reads
    .selectFrom('fit')
    .leftJoin('person', 'person.id', 'fit.requested_by')
    .select(LINE_COLUMNS)
    .select('person.display_name as requested_by_name')
    .select(sql<number>`(SELECT count(*) FROM fit_measure m WHERE m.fit_id = fit.id AND m.is_new = 1)`.as('new_measures'))
}

export async function nextFitNumber(tx: Tx, targetId: string): Promise<number> {
  const row = await tx.selectFrom('fit').select(tx.fn.max('number').as('last')).where('target_id', '=', targetId).executeTakeFirst()
  return (row?.last ?? 0) + 1
}

export async function insertFit(tx: Tx, fit: Insertable<FitTable>): Promise<void> {
  await tx.insertInto('fit').values(fit).execute()
}

export async function findFit(reads: Reads, id: string): Promise<FitRecord | undefined> {
  return fits(reads).where('fit.id', '=', id).executeTakeFirst()
}

export async function getFit(reads: Reads, id: string): Promise<FitRecord> {
  const fit = await findFit(reads, id)
  if (!fit) throw notFound()
  return fit
}

/** Fits of one target computed from the very same request, newest first. */
export async function listFitsOfInput(reads: Reads, input: { targetId: string; inputHash: string; engineVersion: string }): Promise<FitRecord[]> {
  return fits(reads)
    .where('fit.target_id', '=', input.targetId)
    .where('fit.input_hash', '=', input.inputHash)
    .where('fit.engine_version', '=', input.engineVersion)
    .orderBy('fit.number', 'desc')
    .execute()
}

export async function listFitsOfTarget(reads: Reads, targetId: string): Promise<FitLine[]> {
  return fitLines(reads).where('fit.target_id', '=', targetId).orderBy('fit.number', 'desc').execute()
}

export async function listFitsInStates(reads: Reads, targetId: string, states: readonly FitStateName[]): Promise<FitLine[]> {
  return fitLines(reads).where('fit.target_id', '=', targetId).where('fit.state', 'in', [...states]).orderBy('fit.number', 'desc').execute()
}

/** The newest fit of each target. */
export async function listLatestFits(reads: Reads, targetIds: readonly string[]): Promise<FitLine[]> {
  return fitLines(reads)
    .where(sql<boolean>`fit.target_id IN (SELECT value FROM json_each(${JSON.stringify(targetIds)}))`)
    .where(sql<boolean>`fit.number = (SELECT max(f.number) FROM fit f WHERE f.target_id = fit.target_id)`)
    .execute()
}

/** Finished fits of these programmes that nobody has ruled on, the longest waiting first. */
export async function listFitsForDesk(reads: Reads, programmeIds: readonly string[]): Promise<FitRecord[]> {
  return fits(reads).where(waitsOnDesk(programmeIds)).orderBy('fit.created_at').orderBy('fit.id').execute()
}

export async function countFitsForDesk(reads: Reads, programmeIds: readonly string[]): Promise<number> {
  const { count } = await reads.selectFrom('fit').select(({ fn }) => fn.countAll<number>().as('count')).where(waitsOnDesk(programmeIds)).executeTakeFirstOrThrow()
  return count
}

function waitsOnDesk(programmeIds: readonly string[]) {
  return sql<boolean>`fit.state IN ('done', 'failed')
    AND fit.target_id IN (SELECT id FROM target WHERE programme_id IN (SELECT value FROM json_each(${JSON.stringify(programmeIds)})))
    AND NOT EXISTS (SELECT 1 FROM ruling r WHERE r.fit_id = fit.id AND r.decision <> 'consent')`
}

/** The fit whose edition is in force. */
export async function findFitInForce(reads: Reads, targetId: string): Promise<FitRecord | undefined> {
  return fits(reads)
    .innerJoin('edition', 'edition.fit_id', 'fit.id')
    .where('edition.target_id', '=', targetId)
    .where('edition.state', '=', 'published')
    .executeTakeFirst()
}

/** Changes a fit that still has the state it was seen in, and raises its version; false where it has moved on. */
export async function updateFitIn(tx: Tx, fitId: string, from: FitStateName, change: Updateable<FitTable>): Promise<boolean> {
  const outcome = await tx
    .updateTable('fit')
    .set(change)
    .set(eb => ({ version: eb('version', '+', 1) }))
    .where('id', '=', fitId)
    .where('state', '=', from)
    .executeTakeFirst()
  return outcome.numUpdatedRows === 1n
}
