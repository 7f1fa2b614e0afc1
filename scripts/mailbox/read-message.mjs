/**
 * Reads a letter (RFC 5322 with MIME, RFC 2045 to 2047) as far as a mailbox page needs it: its headers and its plain text.
 * @typedef {{ name: string, value: string }} Header
 * @typedef {{ headers: Header[], text: string }} Message
 */

/**
 * @param {Uint8Array} source the letter as it was received
 * @returns {Message} headers unfolded and decoded, in their order, and the first plain text part
 */
export function readMessage(source) {
  // One byte, one character: the bytes of a body are decoded by its own declaration further down.
  const part = splitPart(Buffer.from(source).toString('latin1'))
  return {
    headers: part.headers.map(({ name, value }) => ({ name, value: decodeWords(Buffer.from(value, 'latin1').toString('utf8')) })),
    text: plainText(part) ?? '',
  }
}

/**
 * @param {Message} message
 * @param {string} name in any letter case
 * @returns {string} the header's value, empty where there is none
 */
export function headerOf(message, name) {
  return message.headers.find(header => header.name.toLowerCase() === name.toLowerCase())?.value ?? ''
}

/**
 * @typedef {{ headers: Header[], body: string }} Part
 * @param {string} source
 * @returns {Part}
 */
function splitPart(source) {
  const end = /\r?\n\r?\n/.exec(source)
  const head = end ? source.slice(0, end.index) : source
  const body = end ? source.slice(end.index + end[0].length) : ''
  const lines = head.replace(/\r?\n(?=[ \t])/g, '').split(/\r?\n/)
  const headers = lines.flatMap((line) => {
    const colon = line.indexOf(':')
    return colon > 0 ? [{ name: line.slice(0, colon), value: line.slice(colon + 1).trim() }] : []
  })
  return { headers, body }
}

/**
 * @param {Part} part
 * @returns {string | null} null where the part holds no plain text
 */
function plainText(part) {
  const valueOf = (/** @type {string} */ name) => part.headers.find(header => header.name.toLowerCase() === name)?.value ?? ''
  const type = valueOf('content-type') || 'text/plain'
  const boundary = /^multipart\//i.test(type) ? parameter(type, 'boundary') : null
  if (boundary) {
    const inner = part.body.split(`--${boundary}`).slice(1, -1).map(text => splitPart(text.replace(/^\r?\n/, '')))
    return inner.map(plainText).find(text => text !== null) ?? null
  }
  if (!/^text\/plain\b/i.test(type)) return null
  const bytes = decodeTransfer(part.body, valueOf('content-transfer-encoding').toLowerCase())
  return decodeCharset(bytes, parameter(type, 'charset') ?? 'utf-8').replace(/\r\n/g, '\n')
}

/**
 * @param {string} value
 * @param {string} name
 */
function parameter(value, name) {
  const match = new RegExp(`;\\s*${name}\\s*=\\s*(?:"([^"]*)"|([^;\\s]+))`, 'i').exec(value)
  return match ? match[1] ?? match[2] ?? null : null
}

/**
 * @param {string} body one byte a character
 * @param {string} encoding
 */
function decodeTransfer(body, encoding) {
  if (encoding === 'base64') return Buffer.from(body, 'base64')
  if (encoding === 'quoted-printable') return fromQuotedPrintable(body.replace(/[ \t]+(?=\r?\n)/g, '').replace(/=\r?\n/g, ''))
  return Buffer.from(body, 'latin1')
}

/** @param {string} text */
function fromQuotedPrintable(text) {
  return Buffer.from(text.replace(/=([0-9A-Fa-f]{2})/g, (_, hex) => String.fromCharCode(parseInt(hex, 16))), 'latin1')
}

/**
 * @param {Uint8Array} bytes
 * @param {string} charset
 */
function decodeCharset(bytes, charset) {
  try {
    return new TextDecoder(charset).decode(bytes)
  }
  catch (error) {
    if (error instanceof RangeError) return `[This text is in "${charset}", which cannot be shown.]`
    throw error
  }
}

/**
 * RFC 2047: =?charset?Q?…?= and =?charset?B?…?=; white space between two such words is none.
 * @param {string} value
 */
function decodeWords(value) {
  return value
    .replace(/(=\?[^?]+\?[QB]\?[^?]*\?=)\s+(?==\?[^?]+\?[QB]\?)/gi, '$1')
    .replace(/=\?([^?*]+)(?:\*[^?]*)?\?([QB])\?([^?]*)\?=/gi, (_, charset, kind, text) => decodeCharset(
      kind.toUpperCase() === 'B' ? Buffer.from(text, 'base64') : fromQuotedPrintable(text.replace(/_/g, ' ')),
      charset,
    ))
}
