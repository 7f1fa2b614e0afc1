import { createHash } from 'node:crypto'

const sha256Hex = (text: string) => createHash('sha256').update(text, 'utf8').digest('hex')

/**
 * @param texts the golden outcomes in order
 * @returns SHA-256 of each, to find a difference by, and of all of them together, hexadecimal.
 */
export function goldenHashes(texts: string[]): { whole: string, each: string[] } {
  const each = texts.map(sha256Hex)
  return { whole: sha256Hex(each.join('\n')), each }
}
