import { mkdirSync } from 'node:fs'
import { basename, join } from 'node:path'
import { CACHE, ROOT, inRoot } from './paths.mjs'

/**
 * Bundles a TypeScript file of the project for Node into node_modules/.cache, packages left outside.
 * @param {string} file relative to the project's root
 * @returns {Promise<string>} the path of the bundle
 */
export async function bundle(file) {
  const { build } = await import('esbuild')
  mkdirSync(CACHE, { recursive: true })
  const outfile = join(CACHE, `${basename(file, '.ts')}.mjs`)
  await build({
    entryPoints: [inRoot(file)], outfile, bundle: true, platform: 'node', format: 'esm', target: 'node20', packages: 'external', logLevel: 'error',
    absWorkingDir: ROOT, alias: { '~~': ROOT, '#shared': inRoot('shared') },
  })
  return outfile
}
