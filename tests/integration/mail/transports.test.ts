import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { SMTPServer } from 'smtp-server'
import type { SMTPServerOptions } from 'smtp-server'
import { afterEach, describe, expect, it } from 'vitest'
import { openMailFolder } from '../../../scripts/mailbox/mail-folder.mjs'
import { startMailbox } from '../../../scripts/mailbox/start-mailbox.mjs'
import { createCollectingTransport } from '../../../server/mail/transports/collecting-transport'
import { makeTransport } from '../../../server/mail/transports/make-transport'
import { createSmtpTransport } from '../../../server/mail/transports/smtp-transport'
import { describeTransport, letterToSend } from './transport-contract'

const smtpSettings = (port: number) => ({ host: '127.0.0.1', port, from: 'semilatus@example.org', user: null, password: null })

describeTransport('the collecting transport', async () => {
  const transport = createCollectingTransport()
  return { transport, received: async () => transport.collected.map(mail => Buffer.from(mail.source)), close: async () => {} }
})

describeTransport('the SMTP transport', async () => {
  const folder = await mkdtemp(join(tmpdir(), 'semilatus-mailbox-'))
  const mailbox = await startMailbox({ host: '127.0.0.1', smtpPort: 0, webPort: 0, folder })
  const mails = openMailFolder(folder)
  return {
    transport: createSmtpTransport(smtpSettings(mailbox.smtpPort)),
    received: async () => (await Promise.all((await mails.list()).map(letter => mails.source(letter.name)))).filter(source => source !== null),
    close: async () => {
      await mailbox.close()
      await rm(folder, { recursive: true })
    },
  }
})

describe('the SMTP transport against a server that refuses', () => {
  const open: SMTPServer[] = []
  afterEach(async () => {
    for (const server of open.splice(0)) await new Promise<void>(resolve => server.close(resolve))
  })

  async function serverThat(options: SMTPServerOptions): Promise<number> {
    const server = new SMTPServer({ authOptional: true, disabledCommands: ['STARTTLS', 'AUTH'], logger: false, ...options })
    server.on('error', () => {}) // the client breaking off after a refusal is the expected end
    open.push(server)
    await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
    return (server.server.address() as { port: number }).port
  }
  const refusal = (responseCode: number) => Object.assign(new Error('not here'), { responseCode })

  it('says of an unknown mailbox (550) that trying again is pointless', async () => {
    const port = await serverThat({ onRcptTo: (_address, _session, callback) => callback(refusal(550)) })
    await expect(createSmtpTransport(smtpSettings(port)).send(letterToSend)).rejects.toMatchObject({ name: 'MailRefusedError', isPermanent: true })
  })

  it('says of a mailbox that is busy (450) that trying again may help', async () => {
    const port = await serverThat({ onRcptTo: (_address, _session, callback) => callback(refusal(450)) })
    await expect(createSmtpTransport(smtpSettings(port)).send(letterToSend)).rejects.toMatchObject({ name: 'MailRefusedError', isPermanent: false })
  })

  it('says of a server that shuts all out (554 at the greeting) that it may be put in order', async () => {
    const port = await serverThat({ onConnect: (_session, callback) => callback(refusal(554)) })
    await expect(createSmtpTransport(smtpSettings(port)).send(letterToSend)).rejects.toMatchObject({ name: 'MailRefusedError', isPermanent: false })
  })

  it('fails without calling it a refusal where nobody listens', async () => {
    const port = await serverThat({})
    await new Promise<void>(resolve => open.pop()!.close(resolve))
    await expect(createSmtpTransport(smtpSettings(port)).send(letterToSend)).rejects.not.toMatchObject({ name: 'MailRefusedError' })
  })
})

describe('makeTransport', () => {
  it('gives none where the settings name no mail server', () => {
    expect(makeTransport({ smtp: null })).toBeNull()
  })
})
