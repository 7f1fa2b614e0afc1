// Builds the application only where a source differs from what was built last.
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { hashSources } from './hash-sources.mjs'
import { SERVER_ENTRY, inRoot } from './paths.mjs'
import { runCommand } from './run-command.mjs'

const STAMP = inRoot('.output', 'built.sha256')
const SOURCES = ['app', 'server', 'shared', 'fitting', 'public', 'modules', 'nuxt.config.ts', 'tailwind.config.ts', 'package-lock.json']

/** @returns {Promise<boolean>} whether anything was built */
export async function ensureBuilt() {
  const wanted = hashSources(SOURCES)
  if (existsSync(SERVER_ENTRY) && existsSync(STAMP) && readFileSync(STAMP, 'utf8') === wanted) return false
  console.log('Building the application (about half a minute) …')
  rmSync(STAMP, { force: true })
  const code = await runCommand(process.execPath, [inRoot('node_modules', 'nuxt', 'bin', 'nuxt.mjs'), 'build'], { env: { ...process.env, NODE_ENV: 'production' }, quiet: true })
  if (code !== 0) throw new Error('The application could not be built; the reason stands above.')
  writeFileSync(STAMP, wanted)
  return true
}
