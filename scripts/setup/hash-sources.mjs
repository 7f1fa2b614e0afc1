import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs'
import { join, relative } from 'node:path'
import { ROOT, inRoot } from './paths.mjs'

/**
 * SHA-256 over the names and bytes of files and folders.
 * @param {string[]} names relative to the project's root
 */
export function hashSources(names) {
  const hash = createHash('sha256').update(process.versions.modules)
  for (const name of names) if (existsSync(inRoot(name))) add(hash, inRoot(name))
  return hash.digest('hex')
}

/**
 * @param {import('node:crypto').Hash} hash
 * @param {string} path
 */
function add(hash, path) {
  if (!statSync(path).isDirectory()) {
    hash.update(`${relative(ROOT, path)}\0`).update(readFileSync(path))
    return
  }
  for (const entry of readdirSync(path).sort()) if (entry !== 'node_modules') add(hash, join(path, entry))
}
