import { createTransport } from 'nodemailer'
import type { MailTransport, OutgoingMail } from '../outbox/mail-transport'
import { composeMessage } from './compose-message'

export interface CollectedMail extends OutgoingMail {
  /** The letter as it would have gone over the wire (RFC 5322). */
  source: string
}

export interface CollectingTransport extends MailTransport {
  readonly collected: readonly CollectedMail[]
}

/** Keeps every letter in memory, composed as the mail server would get it. For tests and for trying things out. */
export function createCollectingTransport(from = 'semilatus@example.org'): CollectingTransport {
  const transporter = createTransport({ streamTransport: true, buffer: true, newline: 'windows' })
  const collected: CollectedMail[] = []
  return {
    collected,
    async send(mail) {
      const { message } = await transporter.sendMail(composeMessage(mail, from))
      collected.push({ ...mail, source: message.toString() })
    },
  }
}
