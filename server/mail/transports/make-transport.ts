import type { Settings } from '../../config/env'
import type { MailTransport } from '../outbox/mail-transport'
import { createSmtpTransport } from './smtp-transport'

/** The transport that the settings ask for; null where this installation sends no mail. */
export function makeTransport(settings: Pick<Settings, 'smtp'>): MailTransport | null {
  return settings.smtp === null ? null : createSmtpTransport(settings.smtp)
}
