import { existsSync, statSync } from 'node:fs'
import { builtinModules } from 'node:module'
import { join, relative, sep } from 'node:path'
import { fileURLToPath } from 'node:url'
import ts from 'typescript'

export const ROOT = fileURLToPath(new URL('../..', import.meta.url)).replace(/[\\/]$/, '')

export type Resolved =
  | { kind: 'file', path: string }
  | { kind: 'package', name: string }
  | { kind: 'unknown' }

/** Not ours: installed, generated, or outside. */
const GENERATED = /^(?:node_modules|\.nuxt|\.output|\.\.)(?:[\\/]|$)/
const BUILTINS = new Set(builtinModules)
const options = readOptions()
const cache = ts.createModuleResolutionCache(ROOT, name => name, options)

/** The aliases as Nuxt wrote them for the editor and the type check. */
function readOptions(): ts.CompilerOptions {
  const file = join(ROOT, '.nuxt/tsconfig.json')
  const { config, error } = ts.readConfigFile(file, ts.sys.readFile)
  if (error) throw new Error(`${file} cannot be read; run "npx nuxt prepare" first`)
  return ts.parseJsonConfigFileContent({ ...config, files: [], include: [] }, ts.sys, join(ROOT, '.nuxt')).options
}

/** Where an import leads: a file of the project by its path from the root, or a package by its name. */
export function resolveImport(specifier: string, fromPath: string): Resolved {
  const bare = specifier.replace(/\?.*$/, '')
  if (bare.startsWith('node:') || BUILTINS.has(bare)) return { kind: 'package', name: `node:${bare.replace(/^node:/, '')}` }
  const { resolvedModule } = ts.resolveModuleName(bare, join(ROOT, fromPath), options, ts.sys, cache)
  const file = resolvedModule?.resolvedFileName ?? plainFile(bare, fromPath)
  const path = file && relative(ROOT, file).split(sep).join('/')
  if (path && !GENERATED.test(path)) return { kind: 'file', path }
  if (bare.startsWith('.') && GENERATED.test(relative(ROOT, join(ROOT, fromPath, '..', bare)))) return { kind: 'package', name: 'generated files' }
  if (/^(?:\.|~|@\/|@@\/|#shared|#server)/.test(bare)) return { kind: 'unknown' }
  return { kind: 'package', name: packageName(bare) }
}

/** Styles, components and other files that TypeScript itself does not resolve. */
function plainFile(specifier: string, fromPath: string): string | null {
  const candidates = specifier.startsWith('.') ? [join(ROOT, fromPath, '..', specifier)] : aliased(specifier)
  return candidates.find(candidate => existsSync(candidate) && statSync(candidate).isFile()) ?? null
}

function aliased(specifier: string): string[] {
  const base = options.pathsBasePath as string | undefined
  return Object.entries(options.paths ?? {}).flatMap(([pattern, targets]) => {
    const prefix = pattern.replace(/\*$/, '')
    const matches = pattern.endsWith('*') && specifier.startsWith(prefix)
    return matches ? targets.map(target => join(base ?? join(ROOT, '.nuxt'), target.replace('*', specifier.slice(prefix.length)))) : []
  })
}

function packageName(specifier: string): string {
  return specifier.split('/').slice(0, specifier.startsWith('@') ? 2 : 1).join('/')
}
