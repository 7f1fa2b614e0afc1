import { randomBytes } from 'node:crypto'
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

/**
 * The key of the session cookies, kept in the data folder (mode 0600) and made at the first start.
 * @param {string} dataDir
 */
export function sessionSecret(dataDir) {
  mkdirSync(dataDir, { recursive: true, mode: 0o700 })
  const file = join(dataDir, 'session-secret')
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('base64url'), { mode: 0o600, flag: 'wx' })
  chmodSync(file, 0o600)
  const secret = readFileSync(file, 'utf8').trim()
  if (secret.length < 32) throw new Error(`${file} holds fewer than 32 characters. Delete it: a new one is made and everybody signs in again.`)
  return secret
}
