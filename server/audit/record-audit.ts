import type { Actor } from '#shared/schemas/people'
import { insertAuditEvent } from '../repositories/audit-repository'
import type { Tx } from '../repositories/connection'
import type { AuditEvent } from './audit-event'

/** The part of the context that an audit row needs. */
export interface Recorder {
  clock: { now(): string }
  actor: Actor | null
  origin: 'server' | 'command-line'
}

/** Writes who did what, when and to what, in the transaction of the change itself. */
export async function recordAudit(tx: Tx, recorder: Recorder, event: AuditEvent): Promise<void> {
  await insertAuditEvent(tx, {
    at: recorder.clock.now(),
    actor_id: recorder.actor?.personId ?? null,
    actor_kind: recorder.actor ? 'person' : recorder.origin === 'command-line' ? 'command-line' : 'system',
    event: event.event,
    subject_kind: event.subjectKind,
    subject_id: event.subjectId,
    target_id: event.targetId ?? null,
    detail: JSON.stringify(event.detail),
  })
}
