// A mailbox on this computer for the demo: it takes every letter, keeps it in a folder and lists it on a plain page.
// Settings: MAILBOX_HOST (127.0.0.1), MAILBOX_SMTP_PORT (2525), MAILBOX_PORT (3080), MAILBOX_DIR (.data/mailbox).
import { startMailbox } from './mailbox/start-mailbox.mjs'

const { MAILBOX_HOST = '127.0.0.1', MAILBOX_SMTP_PORT = '2525', MAILBOX_PORT = '3080', MAILBOX_DIR = '.data/mailbox' } = process.env

try {
  const mailbox = await startMailbox({ host: MAILBOX_HOST, smtpPort: Number(MAILBOX_SMTP_PORT), webPort: Number(MAILBOX_PORT), folder: MAILBOX_DIR })
  console.log(`Mailbox: letters to ${MAILBOX_HOST}:${mailbox.smtpPort}, page at http://${MAILBOX_HOST}:${mailbox.webPort}/`)
  const end = () => void mailbox.close().then(() => process.exit(0))
  process.once('SIGTERM', end)
  process.once('SIGINT', end)
}
catch (error) {
  console.error(`The mailbox could not start: ${error instanceof Error ? error.message : error}`)
  process.exit(1)
}
