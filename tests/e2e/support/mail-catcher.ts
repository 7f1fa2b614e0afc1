import { SMTPServer } from 'smtp-server'
import type { AddressInfo } from 'node:net'

export interface MailCatcher {
  port: number
  messages: { to: string[], raw: string }[]
  stop(): Promise<void>
}

/** A local SMTP server that keeps what it receives. */
export async function startMailCatcher(): Promise<MailCatcher> {
  const messages: MailCatcher['messages'] = []
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData(stream, session, callback) {
      const parts: Buffer[] = []
      stream.on('data', (part: Buffer) => parts.push(part))
      stream.on('end', () => {
        messages.push({ to: session.envelope.rcptTo.map(to => to.address), raw: Buffer.concat(parts).toString('utf8') })
        callback()
      })
    },
  })
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  return {
    port: (server.server.address() as AddressInfo).port,
    messages,
    stop: () => new Promise(resolve => server.close(() => resolve())),
  }
}
