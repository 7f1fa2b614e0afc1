import { z } from 'zod'

const TOPIC = /^(?:desk|(?:target|fit|batch):[a-z2-7]{26})$/
const MOST_TOPICS = 50

/** What one stream listens to, e.g. "target:ID,desk". */
export const eventsQuerySchema = z.object({
  topics: z.string().max(MOST_TOPICS * 40).transform(text => [...new Set(text.split(','))])
    .pipe(z.array(z.string().regex(TOPIC, 'topics are desk, target:ID, fit:ID and batch:ID')).min(1).max(MOST_TOPICS)),
})

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
  /** The target, person or programme it was about; null for what has no name, such as a letter. */
  subjectName: string | null
  detail: Record<string, unknown>
}
