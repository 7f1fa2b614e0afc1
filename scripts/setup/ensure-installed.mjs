// Installs the packages only where the lock, the Node version or the machine differs from the last installation.
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { CACHE, inRoot } from './paths.mjs'
import { runCommand } from './run-command.mjs'

const STAMP = join(CACHE, 'installed.sha256')

function wantedStamp() {
  const hash = createHash('sha256')
  hash.update(readFileSync(inRoot('package-lock.json')))
  hash.update(`${process.versions.modules} ${process.platform} ${process.arch}`)
  return hash.digest('hex')
}

/** @returns {Promise<boolean>} whether anything was installed */
export async function ensureInstalled() {
  const wanted = wantedStamp()
  if (existsSync(STAMP) && readFileSync(STAMP, 'utf8') === wanted) return false
  console.log('Installing packages (one to three minutes; better-sqlite3 is compiled here) …')
  const env = { ...process.env }
  // Under NODE_ENV=production npm would leave out what building and testing need.
  delete env.NODE_ENV
  const code = await runCommand('npm', ['ci', '--include=dev'], { env, quiet: true })
  if (code !== 0) {
    throw new Error('The packages could not be installed (npm\'s words are above). A missing compiler is the usual reason: python3, make and g++ are needed once.')
  }
  mkdirSync(CACHE, { recursive: true })
  writeFileSync(STAMP, wanted)
  return true
}
