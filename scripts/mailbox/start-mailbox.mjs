import { once } from 'node:events'
import { createServer } from 'node:http'
import { SMTPServer } from 'smtp-server'
import { openMailFolder } from './mail-folder.mjs'
import { STYLE, letterPage, listPage, missingPage } from './page.mjs'
import { readMessage } from './read-message.mjs'

const LARGEST_LETTER_BYTES = 5 * 1024 * 1024

/**
 * Starts a mail server that delivers nothing further: it keeps what it is sent and lists it on a web page.
 * @param {{ host: string, smtpPort: number, webPort: number, folder: string }} options a port of 0 takes any free one
 */
export async function startMailbox({ host, smtpPort, webPort, folder }) {
  const mails = openMailFolder(folder)
  const smtp = smtpServer(mails)
  const web = webServer(mails)
  smtp.listen(smtpPort, host)
  web.listen(webPort, host)
  await Promise.all([listening(smtp.server), listening(web)])
  return {
    smtpPort: portOf(smtp.server),
    webPort: portOf(web),
    async close() {
      web.closeAllConnections()
      await Promise.all([
        new Promise(resolve => web.close(resolve)),
        new Promise(resolve => smtp.close(() => resolve(undefined))),
      ])
    },
  }
}

/** @param {import('./mail-folder.mjs').MailFolder} mails */
function smtpServer(mails) {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    size: LARGEST_LETTER_BYTES,
    logger: false,
    onData(stream, _session, callback) {
      receive(stream).then(source => mails.keep(source, Date.now())).then(() => callback(), callback)
    },
  })
  // A client that breaks off is no reason to end.
  server.on('error', error => console.error(`mailbox: ${error.message}`))
  return server
}

/**
 * @param {import('smtp-server').SMTPServerDataStream} stream
 * @returns {Promise<Buffer>}
 */
async function receive(stream) {
  const chunks = []
  for await (const chunk of stream) chunks.push(chunk)
  if (stream.sizeExceeded) throw Object.assign(new Error(`Letters of more than ${LARGEST_LETTER_BYTES} bytes are not taken.`), { responseCode: 552 })
  return Buffer.concat(chunks)
}

/** @param {import('./mail-folder.mjs').MailFolder} mails */
function webServer(mails) {
  return createServer((request, response) => {
    answer(mails, request.url ?? '/').then(({ status, type, body }) => {
      response.writeHead(status, {
        'Content-Type': type,
        'Content-Security-Policy': "default-src 'none'; style-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'",
        'X-Content-Type-Options': 'nosniff',
        'Referrer-Policy': 'no-referrer',
        'Cache-Control': 'no-store',
      }).end(body)
    }, (error) => {
      console.error(error)
      response.writeHead(500, { 'Content-Type': 'text/plain; charset=utf-8' }).end('The mailbox could not answer; the reason stands in its log.')
    })
  })
}

/**
 * @param {import('./mail-folder.mjs').MailFolder} mails
 * @param {string} url
 */
async function answer(mails, url) {
  const html = 'text/html; charset=utf-8'
  const path = url.split('?')[0] ?? '/'
  if (path === '/') return { status: 200, type: html, body: listPage(await mails.list()) }
  if (path === '/style.css') return { status: 200, type: 'text/css; charset=utf-8', body: STYLE }
  const [, name, view] = /^\/letters\/([^/]+)(\/source)?$/.exec(path) ?? []
  const source = name ? await mails.source(name) : null
  if (name === undefined || source === null) return { status: 404, type: html, body: missingPage() }
  if (view) return { status: 200, type: 'text/plain; charset=utf-8', body: source }
  return { status: 200, type: html, body: letterPage({ name, receivedMs: Number(name.slice(0, 13)), message: readMessage(source) }) }
}

/** @param {import('node:net').Server} server */
async function listening(server) {
  if (!server.listening) await once(server, 'listening')
}

/** @param {import('node:net').Server} server */
function portOf(server) {
  const address = server.address()
  if (address === null || typeof address === 'string') throw new Error('The mailbox does not listen on a port.')
  return address.port
}
