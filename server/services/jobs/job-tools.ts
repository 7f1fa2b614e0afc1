import type { FitOutcome, FitRequest, Progress } from '../../../fitting/types'
import type { MailTransport } from '../../mail/outbox/mail-transport'

export type { FitOutcome }

/** What job handlers need from outside the house: put together in server/plugins, replaced in tests. */
export interface JobTools {
  /** Runs the engine off the event loop; rejects only where the worker died or `signal` aborted it. */
  computeFit(request: FitRequest, options: { onProgress: (progress: Progress) => void, signal: AbortSignal }): Promise<FitOutcome>
  /** null: this installation sends no mail, and letters stay in the outbox. */
  mailTransport: MailTransport | null
}
