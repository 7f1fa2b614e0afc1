import { describe, expect, it } from 'vitest'
import { headerOf, readMessage } from '../../../scripts/mailbox/read-message.mjs'
import type { MailTransport, OutgoingMail } from '../../../server/mail/outbox/mail-transport'

/** A transport under test, with a way to see the letters that arrived at its far end, as bytes. */
export interface TransportUnderTest {
  transport: MailTransport
  received(): Promise<Buffer[]>
  close(): Promise<void>
}

export const letterToSend: OutgoingMail = {
  to: 'mirelle@example.org',
  subject: 'Linden 12 AB: θ and ρ of edition 2 are published, superseding those of edition 1',
  bodyText: `P 62.41 ± 0.38 yr\n\n.a line that begins with a dot\n${'long '.repeat(300)}\n`,
  unsubscribeUrl: 'https://orbits.example.org/unsubscribe/abcdefghijklmnopqrstuvwxyz234567abcdefghijklmnopqrstuvwxyz',
  messageId: '<abcdefghijklmnopqrstuvwxyz@orbits.example.org>',
}

/** What every mail transport keeps to. */
export function describeTransport(name: string, open: () => Promise<TransportUnderTest>): void {
  describe(`${name} keeps the contract of mail transports`, () => {
    const withTransport = async (check: (under: TransportUnderTest) => Promise<void>) => {
      const under = await open()
      try {
        await check(under)
      }
      finally {
        await under.close()
      }
    }
    const sendOne = (mail: OutgoingMail, check: (message: ReturnType<typeof readMessage>) => void) => withTransport(async ({ transport, received }) => {
      await transport.send(mail)
      const letters = await received()
      expect(letters).toHaveLength(1)
      check(readMessage(letters[0]!))
    })

    it('carries subject, addressee and text whole, whatever their letters', () => sendOne(letterToSend, (message) => {
      expect(headerOf(message, 'subject')).toBe(letterToSend.subject)
      expect(headerOf(message, 'to')).toBe(letterToSend.to)
      expect(message.text.trimEnd()).toBe(letterToSend.bodyText.trimEnd())
    }))

    it('gives one unsubscribe header with the one-click header beside it', () => sendOne(letterToSend, (message) => {
      const names = message.headers.map(header => header.name.toLowerCase())
      expect(names.filter(header => header === 'list-unsubscribe')).toHaveLength(1)
      expect(headerOf(message, 'list-unsubscribe')).toBe(`<${letterToSend.unsubscribeUrl}>`)
      expect(headerOf(message, 'list-unsubscribe-post')).toBe('List-Unsubscribe=One-Click')
    }))

    it('gives neither header to a letter that cannot be stopped', () => sendOne({ ...letterToSend, unsubscribeUrl: null }, (message) => {
      expect(message.headers.filter(header => /^list-unsubscribe/i.test(header.name))).toEqual([])
    }))

    it('keeps the message id over repeated tries', () => withTransport(async ({ transport, received }) => {
      await transport.send(letterToSend)
      await transport.send(letterToSend)
      const ids = (await received()).map(source => headerOf(readMessage(source), 'message-id'))
      expect(ids).toEqual([letterToSend.messageId, letterToSend.messageId])
    }))

    for (const [field, value] of [['subject', 'A target\r\nBcc: everybody@example.org'], ['to', 'a@example.org\nBcc: b@example.org'], ['unsubscribeUrl', 'https://x.example/\r\nX: y']] as const) {
      it(`refuses for good a line break in ${field}, and sends nothing`, () => withTransport(async ({ transport, received }) => {
        await expect(transport.send({ ...letterToSend, [field]: value })).rejects.toMatchObject({ name: 'MailRefusedError', isPermanent: true })
        expect(await received()).toEqual([])
      }))
    }
  })
}
