import type { Decision } from '#shared/schemas/fits'

/**
 * Everything that is recorded, by name, with what each record says beside who, when and about what.
 * Names of people, e-mail addresses and secrets never stand here: people are named by id.
 */
export interface AuditDetails {
  'person.invited': { isObserver: boolean, isAdministrator: boolean, coordinatorOf: string | null }
  'person.joined': { invitationId: string }
  'person.signed-in': Record<string, never>
  'person.signed-out': { sessions: number }
  'person.renamed': Record<string, never>
  'password.changed': { sessionsEnded: number }
  'roles.changed': { isObserver: boolean, isAdministrator: boolean, coordinatorOf: string[] }
  'programme.created': { name: string }
  'target.created': { name: string, kind: string }
  'batch.uploaded': { number: number, sha256: string, rows: number, good: number, bad: number, alreadyHere: number }
  'batch.row-mended': { rowNumber: number, columns: string[] }
  'batch.target-chosen': { targetId: string }
  'batch.sent': { number: number, sent: number, alreadyHere: number, keptAsDraft: number }
  'batch.withdrawn': { number: number }
  'batch.discarded': { number: number }
  'batch.accepted': { number: number, fitId: string }
  'batch.returned': { number: number, fitId: string, reason: string }
  'batch.declined': { number: number, fitId: string, reason: string }
  'fit.requested': { number: number, cause: string, inputHash: string, engineVersion: string }
  'fit.done': { number: number, inputHash: string, engineVersion: string }
  'fit.failed': { number: number, refusal: string }
  'fit.accepted': { number: number, decision: Decision, reason: string }
  'fit.declined': { number: number, decision: Decision, reason: string }
  'fit.returned': { number: number, decision: Decision, reason: string }
  'fit.superseded': { number: number, by: string | null }
  'measure.set-aside': { fitId: string, reason: string }
  'measure.taken-back': { fitId: string }
  'edition.published': { number: number, fitId: string, sha256: string }
  'edition.superseded': { number: number, by: number }
  'edition.withdrawn': { number: number, reason: string }
  'follow.started': Record<string, never>
  'follow.stopped': Record<string, never>
  'mail.stopped': { scope: 'target' | 'all' }
  'mail.sent': { template: string, attempts: number }
  'mail.dead': { template: string, attempts: number }
  'job.dead': { name: string, attempts: number }
}

export type AuditEventName = keyof AuditDetails

export type SubjectKind = 'person' | 'invitation' | 'programme' | 'target' | 'batch' | 'measure' | 'fit' | 'edition' | 'mail' | 'job'

export type AuditEvent = {
  [Name in AuditEventName]: {
    event: Name
    subjectKind: SubjectKind
    subjectId: string
    targetId?: string | null
    detail: AuditDetails[Name]
  }
}[AuditEventName]
