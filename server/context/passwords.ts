import { randomBytes, scrypt, timingSafeEqual } from 'node:crypto'

export interface Passwords {
  hash(password: string): Promise<string>
  /** In constant time; where there is no hash it still computes one, so that an unknown address takes as long as a known one. */
  matches(password: string, hash: string | null): Promise<boolean>
}

export interface ScryptCost {
  /** log2 of N. */
  logN: number
  r: number
  p: number
}

/** OWASP, Password Storage Cheat Sheet (2024): N = 2^15, r = 8, p = 3; about 32 MiB each. */
export const SCRYPT_COST: ScryptCost = { logN: 15, r: 8, p: 3 }

const KEY_BYTES = 32

/** Passwords by scrypt (RFC 7914), kept as $scrypt$ln=…,r=…,p=…$salt$key so that the cost can be raised later. */
export function createPasswords(cost: ScryptCost = SCRYPT_COST): Passwords {
  return {
    async hash(password) {
      const salt = randomBytes(16)
      const key = await deriveKey(password, salt, cost)
      return `$scrypt$ln=${cost.logN},r=${cost.r},p=${cost.p}$${salt.toString('base64')}$${key.toString('base64')}`
    },
    async matches(password, hash) {
      if (hash === null) {
        await deriveKey(password, randomBytes(16), cost)
        return false
      }
      const stored = parseHash(hash)
      return timingSafeEqual(await deriveKey(password, stored.salt, stored.cost), stored.key)
    },
  }
}

function parseHash(hash: string): { cost: ScryptCost, salt: Buffer, key: Buffer } {
  const parts = /^\$scrypt\$ln=(\d+),r=(\d+),p=(\d+)\$([^$]+)\$([^$]+)$/.exec(hash)
  if (!parts) throw new Error('A stored password hash is not of the form $scrypt$ln=…,r=…,p=…$salt$key. Have the person invited anew.')
  const [, logN, r, p, salt, key] = parts as unknown as [string, string, string, string, string, string]
  return { cost: { logN: Number(logN), r: Number(r), p: Number(p) }, salt: Buffer.from(salt, 'base64'), key: Buffer.from(key, 'base64') }
}

function deriveKey(password: string, salt: Buffer, { logN, r, p }: ScryptCost): Promise<Buffer> {
  const N = 2 ** logN
  return new Promise((resolve, reject) => {
    // NFC: the same password typed on another keyboard gives the same letters.
    scrypt(password.normalize('NFC'), salt, KEY_BYTES, { N, r, p, maxmem: 256 * N * r }, (error, key) => error ? reject(error) : resolve(key))
  })
}
