import type { SendMailOptions } from 'nodemailer'
import { MailRefusedError } from '../outbox/mail-transport'
import type { OutgoingMail } from '../outbox/mail-transport'

/**
 * Puts a letter into headers and text, the same for every transport. List-Unsubscribe with List-Unsubscribe-Post is the
 * one-click form of RFC 8058; Auto-Submitted (RFC 3834) keeps answering machines quiet.
 */
export function composeMessage(mail: OutgoingMail, from: string): SendMailOptions {
  refuseLineBreaks(mail)
  return {
    from,
    to: { name: '', address: mail.to },
    subject: mail.subject,
    text: mail.bodyText,
    messageId: mail.messageId,
    headers: {
      'Auto-Submitted': 'auto-generated',
      ...(mail.unsubscribeUrl === null ? {} : { 'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click' }),
    },
    // Nested: a flat list gives one header an entry.
    ...(mail.unsubscribeUrl === null ? {} : { list: { unsubscribe: [[mail.unsubscribeUrl]] } }),
    disableFileAccess: true,
    disableUrlAccess: true,
  }
}

/** A line break in a header would begin a header of somebody else's choosing. */
function refuseLineBreaks(mail: OutgoingMail): void {
  const headers = { to: mail.to, subject: mail.subject, 'message-id': mail.messageId, 'list-unsubscribe': mail.unsubscribeUrl ?? '' }
  for (const [name, value] of Object.entries(headers)) {
    if (/[\r\n]/.test(value)) throw new MailRefusedError(`The ${name} header holds a line break; the letter was not sent.`, { isPermanent: true })
  }
}
