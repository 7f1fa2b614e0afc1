import { randomBytes } from 'node:crypto'

export interface Ids {
  /** 128 bits as 26 base-32 letters (a–z, 2–7). */
  newId(): string
  /** A secret of 256 bits as 52 base-32 letters, for links and leases. */
  newToken(): string
}

const LETTERS = 'abcdefghijklmnopqrstuvwxyz234567'

/** RFC 4648 base 32 in small letters, without padding. */
export function base32(bytes: Uint8Array): string {
  let text = ''
  let buffer = 0
  let bits = 0
  for (const byte of bytes) {
    buffer = (buffer << 8) | byte
    bits += 8
    while (bits >= 5) {
      bits -= 5
      text += LETTERS[(buffer >> bits) & 31]
    }
    buffer &= (1 << bits) - 1
  }
  return bits > 0 ? text + LETTERS[(buffer << (5 - bits)) & 31] : text
}

/** Ids from a source of bytes: the system's by default, a seeded one in tests. */
export function makeIds(bytes: (count: number) => Uint8Array = randomBytes): Ids {
  return {
    newId: () => base32(bytes(16)),
    newToken: () => base32(bytes(32)),
  }
}
