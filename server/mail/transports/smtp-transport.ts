import { createTransport } from 'nodemailer'
import type { SmtpSettings } from '../../config/env'
import { MailRefusedError } from '../outbox/mail-transport'
import type { MailTransport } from '../outbox/mail-transport'
import { composeMessage } from './compose-message'

/** Port on which TLS begins with the connection (RFC 8314); elsewhere STARTTLS is taken where it is offered. */
const IMPLICIT_TLS_PORT = 465
const TIMEOUT_MS = 20_000
/** Commands whose refusal is about this letter; refused before them, the mail server as such is not in order. */
const LETTER_COMMANDS = ['MAIL FROM', 'RCPT TO', 'DATA']

/** Sends through a mail server, one connection a letter. */
export function createSmtpTransport(settings: SmtpSettings): MailTransport {
  const { host, port, from, user, password } = settings
  const transporter = createTransport({
    host,
    port,
    secure: port === IMPLICIT_TLS_PORT,
    ...(user !== null && password !== null ? { auth: { user, pass: password } } : {}),
    connectionTimeout: TIMEOUT_MS,
    greetingTimeout: TIMEOUT_MS,
    socketTimeout: TIMEOUT_MS,
  })
  return {
    async send(mail) {
      const message = composeMessage(mail, from)
      try {
        await transporter.sendMail(message)
      }
      catch (cause) {
        throw refusalOf(cause) ?? cause
      }
    },
  }
}

/** The reply code tells: 4xx asks to come again, 5xx does not (RFC 5321, 4.2.1). null where no reply came. */
function refusalOf(error: unknown): MailRefusedError | null {
  if (!(error instanceof Error)) return null
  const { responseCode, command, response, code } = error as Error & { responseCode?: number, command?: string, response?: string, code?: string }
  if (responseCode === undefined) {
    return code === 'EENVELOPE' ? new MailRefusedError(error.message, { isPermanent: true, cause: error }) : null
  }
  const isAboutLetter = LETTER_COMMANDS.includes(command ?? '')
  return new MailRefusedError(`${command ?? 'The mail server'} was answered ${response ?? responseCode}`, {
    isPermanent: isAboutLetter && responseCode >= 500,
    cause: error,
  })
}
