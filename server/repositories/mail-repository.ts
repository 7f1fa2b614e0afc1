import { sql } from 'kysely'
import type { Insertable, RawBuilder, Selectable, Updateable } from 'kysely'
import type { MailOutTable } from '../db/schema'
import { notFound } from '../errors/app-error'
import type { Reads, Tx } from './connection'

/** A letter with what decides whether and where it goes. */
export type LetterRecord = Selectable<MailOutTable> & {
  /** null where the account is closed. */
  email: string | null
  is_stopped: 0 | 1
}

export interface Recipient {
  person_id: string
  /** Measures credited to this person that were used; 0 for those who only follow. */
  own_measures: number
}

/** False where the same letter (by its dedupe key) is in the outbox already. */
export async function insertLetter(tx: Tx, row: Insertable<MailOutTable>): Promise<boolean> {
  const outcome = await tx.insertInto('mail_out').values(row).onConflict(c => c.column('dedupe_key').doNothing()).executeTakeFirst()
  return (outcome.numInsertedOrUpdatedRows ?? 0n) > 0n
}

export async function findLetter(reads: Reads, id: string): Promise<LetterRecord | undefined> {
  return reads
    .selectFrom('mail_out')
    .innerJoin('person', 'person.id', 'mail_out.person_id')
    .selectAll('mail_out')
    .select(sql<string | null>`CASE person.state WHEN 'active' THEN person.email END`.as('email'))
    .select(silenced(sql.ref('mail_out.person_id'), sql.ref('mail_out.target_id')).as('is_stopped'))
    .where('mail_out.id', '=', id)
    .executeTakeFirst()
}

/** Changes a letter that still waits; false where it was sent, stopped or given up meanwhile. */
export async function updateQueuedLetter(tx: Tx, id: string, change: Updateable<MailOutTable>): Promise<boolean> {
  const outcome = await tx.updateTable('mail_out').set(change).where('id', '=', id).where('state', '=', 'queued').executeTakeFirst()
  return outcome.numUpdatedRows === 1n
}

/** The letter that an unsubscribe link came with. */
export async function getLetterByUnsubscribeHash(reads: Reads, hash: string): Promise<{ person_id: string; target_id: string | null; target_name: string | null }> {
  const row = await reads
    .selectFrom('mail_out')
    .leftJoin('target', 'target.id', 'mail_out.target_id')
    .select(['mail_out.person_id', 'mail_out.target_id', 'target.name as target_name'])
    .where('mail_out.unsubscribe_hash', '=', hash)
    .executeTakeFirst()
  if (!row) throw notFound()
  return row
}

/** Whether a person asked for no mail about a target; without a target, whether for none at all. */
export async function isSilenced(reads: Reads, personId: string, targetId: string | null): Promise<boolean> {
  const { rows } = await sql<{ is_silenced: 0 | 1 }>`SELECT ${silenced(sql`${personId}`, sql`${targetId}`)} AS is_silenced`.execute(reads)
  return rows[0]?.is_silenced === 1
}

/** Every stop ends the follows that it covers, so a follow that stands was asked for after it, and is heard. */
function silenced(personId: RawBuilder<unknown>, targetId: RawBuilder<unknown>): RawBuilder<0 | 1> {
  return sql<0 | 1>`(
    EXISTS (SELECT 1 FROM mail_stop s WHERE s.person_id = ${personId} AND (s.target_id IS NULL OR s.target_id = ${targetId}))
    AND NOT EXISTS (SELECT 1 FROM follow w WHERE w.person_id = ${personId} AND w.target_id = ${targetId}))`
}

/** True where the stop is new. */
export async function insertMailStop(tx: Tx, stop: { id: string; person_id: string; target_id: string | null; created_at: string }): Promise<boolean> {
  const outcome = await tx.insertInto('mail_stop').values(stop).onConflict(c => c.doNothing()).executeTakeFirst()
  return (outcome.numInsertedOrUpdatedRows ?? 0n) > 0n
}

export async function followsAnything(reads: Reads, personId: string): Promise<boolean> {
  return await reads.selectFrom('follow').select('person_id').where('person_id', '=', personId).limit(1).executeTakeFirst() !== undefined
}

/** Ends what a person follows: one target, or all of them. */
export async function endFollows(tx: Tx, personId: string, targetId: string | null): Promise<void> {
  await tx.deleteFrom('follow').where('person_id', '=', personId).$if(targetId !== null, query => query.where('target_id', '=', targetId)).execute()
}

/** Stops what waits for a person: about one target, or all of it. */
export async function stopQueuedLetters(tx: Tx, personId: string, targetId: string | null): Promise<void> {
  await tx
    .updateTable('mail_out')
    .set({ state: 'stopped', unsubscribe_url: null })
    .where('person_id', '=', personId)
    .where('state', '=', 'queued')
    .$if(targetId !== null, query => query.where('target_id', '=', targetId))
    .execute()
}

/** Followers of a target and the people behind observers whose measures a fit used, without those who asked for no such mail. */
export async function listEditionRecipients(reads: Reads, { targetId, fitId }: { targetId: string; fitId: string }): Promise<Recipient[]> {
  const { rows } = await sql<Recipient>`
    WITH credited AS (
      SELECT o.person_id, count(*) AS own_measures
      FROM fit_measure f
      JOIN measure_observer mo ON mo.measure_id = f.measure_id
      JOIN observer o ON o.id = mo.observer_id
      WHERE f.fit_id = ${fitId} AND f.role = 'used' AND o.person_id IS NOT NULL
      GROUP BY o.person_id
    )
    SELECT p.id AS person_id, ifnull(c.own_measures, 0) AS own_measures
    FROM person p
    LEFT JOIN credited c ON c.person_id = p.id
    WHERE p.state = 'active' AND p.email IS NOT NULL
      AND (c.person_id IS NOT NULL OR EXISTS (SELECT 1 FROM follow w WHERE w.person_id = p.id AND w.target_id = ${targetId}))
      AND NOT ${silenced(sql.ref('p.id'), sql`${targetId}`)}
    ORDER BY p.id`.execute(reads)
  return rows
}
