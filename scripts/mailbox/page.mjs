import { headerOf } from './read-message.mjs'

/**
 * @typedef {import('./read-message.mjs').Message} Message
 * @typedef {{ name: string, receivedMs: number, message: Message }} Letter
 */

export const STYLE = `body { max-width: 46rem; margin: 2rem auto; padding: 0 1rem; font: 1rem/1.5 system-ui, sans-serif; color: #1e2a38; background: #f6f3ec }
table { border-collapse: collapse; width: 100% }
th, td { text-align: left; vertical-align: top; padding: .4rem .75rem .4rem 0; border-bottom: 1px solid #d9d2c3 }
th { white-space: nowrap }
td { overflow-wrap: anywhere }
pre { white-space: pre-wrap; overflow-wrap: anywhere; background: #fffdf8; border: 1px solid #d9d2c3; padding: 1rem }
a { color: #0b6e6e }
`

/** @param {string} text */
export function escapeHtml(text) {
  return text.replace(/[&<>"']/g, character => `&#${character.charCodeAt(0)};`)
}

/** @param {readonly Letter[]} letters */
export function listPage(letters) {
  if (letters.length === 0) {
    return page('Mailbox', '<h1>Mailbox</h1><p>No letter has come yet. Publish an edition of a target that somebody follows, and it arrives here.</p>')
  }
  const rows = letters.map(({ name, receivedMs, message }) => `<tr><td>${time(receivedMs)}</td><td>${escapeHtml(headerOf(message, 'to'))}</td>`
    + `<td><a href="/letters/${name}">${escapeHtml(headerOf(message, 'subject') || '(no subject)')}</a></td></tr>`)
  return page('Mailbox', `<h1>Mailbox</h1><p>${letters.length} ${letters.length === 1 ? 'letter' : 'letters'}, newest first. Nothing leaves this computer.</p>`
    + `<table><thead><tr><th scope="col">Received</th><th scope="col">To</th><th scope="col">Subject</th></tr></thead><tbody>${rows.join('')}</tbody></table>`)
}

/** @param {Letter} letter */
export function letterPage({ name, message }) {
  const headers = message.headers.map(header => `<tr><th scope="row">${escapeHtml(header.name)}</th><td>${linked(header.value)}</td></tr>`)
  const subject = headerOf(message, 'subject') || '(no subject)'
  return page(subject, `<p><a href="/">All letters</a> · <a href="/letters/${name}/source">As it was received</a></p><h1>${escapeHtml(subject)}</h1>`
    + `<pre>${linked(message.text)}</pre><h2>Headers</h2><table><tbody>${headers.join('')}</tbody></table>`)
}

export function missingPage() {
  return page('Not here', '<h1>Not here</h1><p>There is no such letter. <a href="/">All letters</a></p>')
}

/**
 * Escapes, and makes web addresses into links.
 * @param {string} text
 */
function linked(text) {
  return text.split(/(https?:\/\/[^\s<>"]+)/)
    .map((piece, k) => k % 2 === 1 ? `<a href="${escapeHtml(piece)}" rel="noopener noreferrer">${escapeHtml(piece)}</a>` : escapeHtml(piece))
    .join('')
}

/** @param {number} ms */
function time(ms) {
  return new Date(ms).toISOString().replace('T', ' ').slice(0, 19)
}

/**
 * @param {string} title
 * @param {string} body
 */
function page(title, body) {
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escapeHtml(title)}</title>`
    + `<link rel="stylesheet" href="/style.css"></head><body><main>${body}</main></body></html>`
}
