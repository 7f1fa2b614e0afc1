import { createHash } from 'node:crypto'
import canonicalize from 'canonicalize'

/** RFC 8785: keys sorted, numbers as ECMAScript writes them, no white space. The same value gives the same bytes everywhere. */
export function canonicalJson(value: unknown): string {
  const text = canonicalize(value)
  if (text === undefined) throw new TypeError('only a JSON value has a canonical form')
  return text
}

/** SHA-256 of a text's UTF-8 bytes, 64 hexadecimal digits. */
export function sha256Hex(text: string): string {
  return createHash('sha256').update(text, 'utf8').digest('hex')
}
