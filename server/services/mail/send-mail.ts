import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { PermanentJobError } from '../../jobs/contracts/lease'
import type { Lease } from '../../jobs/contracts/lease'
import { MailRefusedError } from '../../mail/outbox/mail-transport'
import type { MailTransport, OutgoingMail } from '../../mail/outbox/mail-transport'
import { findLetter, updateQueuedLetter } from '../../repositories/mail-repository'
import type { LetterRecord } from '../../repositories/mail-repository'

/**
 * Sends one letter of the outbox. Only the job runner calls it; it records mail.sent, or mail.dead where the letter is refused
 * for good. At least once: a crash between handing the letter over and writing that down sends it again, under the same
 * Message-ID, by which a receiver can tell. Throws on a failure that may pass, so that the job is tried again later.
 */
export async function sendMail(ctx: Context, transport: MailTransport | null, mailId: string, lease: Lease): Promise<void> {
  const letter = await findLetter(ctx.reads, mailId)
  if (!letter || letter.state !== 'queued') return
  const hindrance = hindranceTo(letter, transport)
  if (hindrance !== null || letter.email === null || transport === null) {
    await settle(ctx, lease, tx => updateQueuedLetter(tx, mailId, { state: 'stopped', last_error: hindrance, unsubscribe_url: null }))
    return
  }
  try {
    await transport.send(outgoing(ctx, letter, letter.email))
  }
  catch (error) {
    await noteFailure(ctx, letter, lease, error)
    throw retried(error, mailId)
  }
  await settle(ctx, lease, async (tx) => {
    const isNoted = await updateQueuedLetter(tx, mailId, {
      state: 'sent', sent_at: ctx.clock.now(), attempts: lease.attempt, last_error: null, unsubscribe_url: null,
    })
    if (isNoted) await recordMail(tx, ctx, letter, 'mail.sent', lease.attempt)
  })
}

/** Gives a letter up once its job is dead, in the transaction that declares it so. Only the job runner calls it. */
export async function giveUpMail(tx: Tx, ctx: Context, mailId: string, reason: string): Promise<void> {
  const letter = await findLetter(tx, mailId)
  if (!letter) return
  const isNoted = await updateQueuedLetter(tx, mailId, { state: 'dead', last_error: letter.last_error ?? reason, unsubscribe_url: null })
  if (isNoted) await recordMail(tx, ctx, letter, 'mail.dead', letter.attempts)
}

/** Why a letter is not sent at all; null where nothing is in its way. */
function hindranceTo(letter: LetterRecord, transport: MailTransport | null): string | null {
  if (letter.email === null) return 'The account is closed.'
  if (letter.is_stopped) return 'The reader asked for no such mail.'
  return transport === null ? 'This installation sends no mail (SEMILATUS_MAIL is none).' : null
}

function outgoing(ctx: Context, letter: LetterRecord, address: string): OutgoingMail {
  return {
    to: address,
    subject: letter.subject,
    bodyText: letter.unsubscribe_url === null ? letter.body_text : `${letter.body_text}\n-- \nStop mail about this target, or all of it:\n${letter.unsubscribe_url}\n`,
    unsubscribeUrl: letter.unsubscribe_url,
    messageId: `<${letter.id}@${new URL(ctx.baseUrl).hostname}>`,
  }
}

async function noteFailure(ctx: Context, letter: LetterRecord, lease: Lease, error: unknown): Promise<void> {
  const reason = error instanceof Error ? error.message : String(error)
  await settle(ctx, lease, tx => updateQueuedLetter(tx, letter.id, { attempts: lease.attempt, last_error: reason.slice(0, 1000) }))
}

/** What the runner is told holds no address: its words go into the log. */
function retried(error: unknown, mailId: string): Error {
  if (error instanceof MailRefusedError && error.isPermanent) return new PermanentJobError(`The letter ${mailId} was refused for good.`)
  return new Error(`The letter ${mailId} could not be handed over; it is tried again later.`)
}

async function settle(ctx: Context, lease: Lease, work: (tx: Tx) => Promise<unknown>): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    await lease.assertHeld(tx)
    await work(tx)
  })
}

async function recordMail(tx: Tx, ctx: Context, letter: LetterRecord, event: 'mail.sent' | 'mail.dead', attempts: number): Promise<void> {
  await recordAudit(tx, ctx, { event, subjectKind: 'mail', subjectId: letter.id, targetId: letter.target_id, detail: { template: letter.template, attempts } })
}
