import type { FitRequest, FitResult, Progress, Refusal } from '../../../fitting/types'

export type FitOutcome = { ok: true, result: FitResult } | { ok: false, refusal: Refusal }

export interface OutgoingMail {
  to: string
  subject: string
  bodyText: string
  /** Page that stops such mail, also the address of the one-click header; null for mail that cannot be stopped. */
  unsubscribeUrl: string | null
  /** Stays the same over repeated tries, so that a receiver can drop the second copy. */
  messageId: string
}

export interface MailTransport {
  send(mail: OutgoingMail): Promise<void>
}

/** What job handlers need from outside the house: put together in server/plugins, replaced in tests. */
export interface JobTools {
  /** Runs the engine off the event loop; rejects only where the worker died or `signal` aborted it. */
  computeFit(request: FitRequest, options: { onProgress: (progress: Progress) => void, signal: AbortSignal }): Promise<FitOutcome>
  /** null: this installation sends no mail, and letters stay in the outbox. */
  mailTransport: MailTransport | null
}
