import { spawnSync } from 'node:child_process'
import { existsSync } from 'node:fs'
import { runCommand } from './run-command.mjs'

/** What compiling better-sqlite3 and the browser tests need from the system: a command and the Debian package that brings it. */
const NEEDED = [
  { command: 'python3', debian: 'python3' },
  { command: 'make', debian: 'make' },
  { command: 'g++', debian: 'g++' },
  { command: 'chromium', debian: 'chromium' },
]

/** @param {string} command */
function isThere(command) {
  return existsSync(`/usr/bin/${command}`) || spawnSync('sh', ['-c', `command -v ${command}`]).status === 0
}

/** Installs what is missing where we are root on Debian, and says what to install elsewhere. */
export async function ensureSystemPackages() {
  const missing = NEEDED.filter(({ command }) => !isThere(command)).map(({ debian }) => debian)
  if (missing.length === 0) return
  const isRoot = process.getuid?.() === 0
  if (!isRoot || !isThere('apt-get')) {
    throw new Error(`Missing on this machine: ${missing.join(', ')}. Install them first (on Debian, as root: apt-get install --no-install-recommends ${missing.join(' ')}).`)
  }
  console.log(`Installing Debian packages: ${missing.join(', ')} …`)
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  if (await runCommand('apt-get', ['update', '-q'], { env, quiet: true }) !== 0) throw new Error('apt-get update failed; its words stand above.')
  if (await runCommand('apt-get', ['install', '-q', '-y', '--no-install-recommends', ...missing], { env, quiet: true }) !== 0) throw new Error('apt-get install failed; its words stand above.')
}
