import { createHash } from 'node:crypto'
import { enqueueJob } from '../../jobs/queue/enqueue-job'
import type { Enqueuer } from '../../jobs/queue/enqueue-job'
import type { Tx } from '../../repositories/connection'
import { insertLetter } from '../../repositories/mail-repository'

/** The part of the context that the outbox needs. */
export interface Sender extends Enqueuer {
  ids: { newId(): string, newToken(): string }
  baseUrl: string
}

export interface NewMail {
  personId: string
  /** What the letter is about; stopping mail of this target stops it. */
  targetId?: string | null
  template: string
  /** A second letter under the same key is not written. */
  dedupeKey: string
  subject: string
  bodyText: string
  canUnsubscribe: boolean
}

/**
 * Puts a letter into the outbox with the job that sends it, in the transaction of the change it tells of: no change without its
 * letter, no letter without its change. The link that stops such mail carries a secret of which only the hash is kept once the
 * letter is out.
 */
export async function queueMail(tx: Tx, sender: Sender, mail: NewMail): Promise<{ mailId: string, isNew: boolean }> {
  const mailId = sender.ids.newId()
  const token = mail.canUnsubscribe ? sender.ids.newToken() : null
  const isNew = await insertLetter(tx, {
    id: mailId,
    person_id: mail.personId,
    target_id: mail.targetId ?? null,
    template: mail.template,
    dedupe_key: mail.dedupeKey,
    subject: mail.subject,
    body_text: mail.bodyText,
    unsubscribe_hash: token === null ? null : unsubscribeHash(token),
    unsubscribe_url: token === null ? null : `${sender.baseUrl}/unsubscribe/${token}`,
    state: 'queued',
    last_error: null,
    created_at: sender.clock.now(),
    sent_at: null,
  })
  if (isNew) await enqueueJob(tx, sender, { name: 'send-mail', payload: { mailId }, uniqueKey: `send-mail:${mailId}` })
  return { mailId, isNew }
}

/** The form in which the secret of an unsubscribe link is kept and looked up. */
export function unsubscribeHash(token: string): string {
  return createHash('sha256').update(token, 'utf8').digest('hex')
}
