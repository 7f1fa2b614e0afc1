import { execFileSync } from 'node:child_process'
import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { ROOT } from './resolve-import'

export interface SourceFile {
  /** From the root, with slashes. */
  path: string
  text: string
}

/** Every file of the repository that is not ignored, by path from the root. */
export function listFiles(): string[] {
  const output = execFileSync('git', ['ls-files', '--cached', '--others', '--exclude-standard', '-z'], { cwd: ROOT, encoding: 'utf8', maxBuffer: 64 * 1024 * 1024 })
  return [...new Set(output.split('\0'))].filter(path => path !== '' && existsSync(join(ROOT, path))).sort()
}

/** The program's own sources with their text. */
export function readSources(): SourceFile[] {
  return listFiles()
    .filter(path => /\.(?:ts|mjs|vue)$/.test(path) && !path.endsWith('.d.ts'))
    .map(path => ({ path, text: readFileSync(join(ROOT, path), 'utf8') }))
}
