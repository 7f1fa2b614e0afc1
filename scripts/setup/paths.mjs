// Where things lie, for scripts that must run before `npm ci`: Node only.
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

export const ROOT = dirname(dirname(dirname(fileURLToPath(import.meta.url))))
export const CACHE = join(ROOT, 'node_modules', '.cache', 'semilatus')
export const SERVER_ENTRY = join(ROOT, '.output', 'server', 'index.mjs')
/** @param {string[]} parts */
export const inRoot = (...parts) => join(ROOT, ...parts)
