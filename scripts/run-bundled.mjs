#!/usr/bin/env node
/**
 * Runs a TypeScript script without a build: node scripts/run-bundled.mjs scripts/NAME.ts [arguments…]
 * esbuild bundles the script with all it imports into node_modules/.cache/semilatus/NAME.HASH.mjs, and Node imports that.
 * The script finds its own arguments in process.argv from index 2 on.
 */
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { basename, join, resolve } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const CACHE = join(ROOT, 'node_modules/.cache/semilatus')
const DAY_MS = 24 * 60 * 60 * 1000
/** Compiled parts and worker pools do not survive bundling; Node resolves them from node_modules as ever. */
const LEFT_OUTSIDE = ['better-sqlite3', 'piscina', 'esbuild', 'vite', 'playwright-core', 'autocannon', 'nuxt', '@nuxt/*']
/** Packages written for `require` ask for Node's own modules by it. */
const REQUIRE_BANNER = "import { createRequire as __createRequire } from 'node:module'; const require = __createRequire(import.meta.url);"

/** @param {string} scriptPath */
async function bundle(scriptPath) {
  const { build } = await import('esbuild')
  const { outputFiles } = await build({
    entryPoints: [scriptPath],
    bundle: true,
    write: false,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    charset: 'utf8',
    logLevel: 'warning',
    external: LEFT_OUTSIDE,
    alias: { '~~': ROOT.replace(/\/$/, ''), '#shared': join(ROOT, 'shared') },
    banner: { js: REQUIRE_BANNER },
  })
  return outputFiles.map(output => output.text).join('')
}

/**
 * The file's name holds the hash of its text, so that two runs at once never overwrite each other.
 * @param {string} name
 * @param {string} text
 */
function store(name, text) {
  mkdirSync(CACHE, { recursive: true })
  const hash = createHash('sha256').update(text).digest('hex').slice(0, 16)
  const file = join(CACHE, `${name}.${hash}.mjs`)
  if (!existsSync(file)) {
    const partial = `${file}.${process.pid}`
    writeFileSync(partial, text)
    renameSync(partial, file)
    dropStale(name, file)
  }
  return file
}

/**
 * @param {string} name
 * @param {string} kept
 */
function dropStale(name, kept) {
  for (const entry of readdirSync(CACHE)) {
    const file = join(CACHE, entry)
    const isStale = entry.startsWith(`${name}.`) && file !== kept && Date.now() - statSync(file).mtimeMs > DAY_MS
    if (isStale) rmSync(file, { force: true })
  }
}

const [scriptArgument, ...rest] = process.argv.slice(2)
if (!scriptArgument) {
  console.error('Which script? Use: node scripts/run-bundled.mjs scripts/NAME.ts [arguments…]')
  process.exit(64)
}
const scriptPath = resolve(ROOT, scriptArgument)
const file = store(basename(scriptPath, '.ts'), await bundle(scriptPath))
process.argv = [process.execPath, scriptPath, ...rest]
await import(pathToFileURL(file).href)
