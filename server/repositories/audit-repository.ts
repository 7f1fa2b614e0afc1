import type { Insertable, Selectable } from 'kysely'
import type { AuditEventTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type AuditRow = Selectable<AuditEventTable> & { actor_name: string | null, subject_name: string | null }

export async function insertAuditEvent(tx: Tx, row: Insertable<AuditEventTable>): Promise<void> {
  await tx.insertInto('audit_event').values(row).execute()
}

/** Newest first, from below `beforeSeq` where given; with the names of who acted and of the target, person or programme it was about. */
export async function listAuditEvents(reads: Reads, { beforeSeq, limit }: { beforeSeq?: number, limit: number }): Promise<AuditRow[]> {
  return await reads.selectFrom('audit_event')
    .leftJoin('person', 'person.id', 'audit_event.actor_id')
    .leftJoin('target', 'target.id', 'audit_event.target_id')
    .leftJoin('person as subject_person', 'subject_person.id', 'audit_event.subject_id')
    .leftJoin('programme', 'programme.id', 'audit_event.subject_id')
    .selectAll('audit_event')
    .select(({ fn }) => [
      'person.display_name as actor_name',
      fn.coalesce('target.name', 'subject_person.display_name', 'programme.name').as('subject_name'),
    ])
    .$if(beforeSeq !== undefined, query => query.where('audit_event.seq', '<', beforeSeq!))
    .orderBy('audit_event.seq', 'desc')
    .limit(limit)
    .execute()
}
