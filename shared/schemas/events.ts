/** What the one event stream (/api/v1/events?topics=target:ID,fit:ID,batch:ID,desk) carries. */
export interface StreamEvent {
  topic: string
  name: 'fit.progress' | 'fit.changed' | 'batch.changed' | 'edition.changed' | 'desk.changed'
  data: { fitId?: string; targetId?: string; batchId?: string; fraction?: number; stage?: string; state?: string }
}

export interface AuditEventView {
  seq: number
  at: string
  actorName: string | null
  event: string
  subjectKind: string
  subjectId: string
  detail: Record<string, unknown>
}
