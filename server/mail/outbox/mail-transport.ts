/** One letter on its way out, complete. */
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
  /** Hands the letter over; rejects with a MailRefusedError where the other side refused it, with any error where it was not reached. */
  send(mail: OutgoingMail): Promise<void>
}

/** The other side took notice of the letter and refused it. */
export class MailRefusedError extends Error {
  /** Whether trying again is pointless: an address that does not exist, a letter that is not taken. */
  readonly isPermanent: boolean

  constructor(reason: string, options: { isPermanent: boolean, cause?: unknown }) {
    super(reason, { cause: options.cause })
    this.name = 'MailRefusedError'
    this.isPermanent = options.isPermanent
  }
}
