import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { escapeHtml, letterPage } from '../../../../scripts/mailbox/page.mjs'
import { headerOf, readMessage } from '../../../../scripts/mailbox/read-message.mjs'
import { createCollectingTransport } from '../../../../server/mail/transports/collecting-transport'

const lines = (...text: string[]) => Buffer.from(text.join('\r\n'))

describe('readMessage', () => {
  it('unfolds headers and decodes their words, across a fold between two of them', () => {
    const message = readMessage(lines(
      'Subject: =?UTF-8?Q?Linden_12_AB=3A_=CE=B8?=',
      ' =?UTF-8?B?IHVuZCDPgQ==?=',
      'X-Long: one',
      '\ttwo',
      '',
      'Text',
    ))
    expect(headerOf(message, 'subject')).toBe('Linden 12 AB: θ und ρ')
    expect(headerOf(message, 'x-long')).toBe('one\ttwo')
    expect(message.text).toBe('Text')
  })

  it('takes the plain text out of a letter in several parts', () => {
    const message = readMessage(lines(
      'Content-Type: multipart/alternative; boundary="b1"', '',
      '--b1', 'Content-Type: text/html', '', '<p>no</p>',
      '--b1', 'Content-Type: text/plain; charset=iso-8859-1', 'Content-Transfer-Encoding: quoted-printable', '', 'M=E4rz', '--b1--', '',
    ))
    expect(message.text.trim()).toBe('März')
  })

  it('reads back whatever text our own letters carry', async () => {
    await fc.assert(fc.asyncProperty(fc.string({ unit: 'grapheme', maxLength: 300 }), async (text) => {
      const transport = createCollectingTransport()
      const bodyText = text.replace(/\r\n?/g, '\n')
      await transport.send({ to: 'reader@example.org', subject: 'Test', bodyText, unsubscribeUrl: null, messageId: '<1@example.org>' })
      expect(readMessage(Buffer.from(transport.collected[0]!.source)).text.replace(/\n+$/, '')).toBe(bodyText.replace(/\n+$/, ''))
    }), { seed: 20261201, numRuns: 60 })
  })
})

describe('letterPage', () => {
  it('shows markup in a letter as text', () => {
    const message = readMessage(lines('Subject: <script>alert(1)</script>', '', '<img src=x onerror=alert(1)> http://127.0.0.1/"><script>'))
    const page = letterPage({ name: '1764547200000-00000000.eml', receivedMs: 0, message })
    expect(page).not.toMatch(/<script|<img/)
    expect(page).toContain(escapeHtml('<img src=x onerror=alert(1)>'))
  })

  it('makes an address into a link', () => {
    const message = readMessage(lines('', '', 'Read it: http://127.0.0.1:3000/orbits/a/1'))
    expect(letterPage({ name: '1764547200000-00000000.eml', receivedMs: 0, message })).toContain('<a href="http://127.0.0.1:3000/orbits/a/1"')
  })
})
