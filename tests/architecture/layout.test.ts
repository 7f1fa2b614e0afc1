import { describe, expect, it } from 'vitest'
import { TOP_FOLDERS } from './rooms'
import { listFiles, readSources } from './source-files'
import { unexplainedSuppressions } from './suppressions'

const files = listFiles()
const sources = readSources()
const baseName = (path: string) => path.replace(/^.*\//, '').replace(/\..*$/, '')

describe('the layout of the repository', () => {
  it('has the folders that are listed and no other', () => {
    const folders = new Set(files.filter(path => path.includes('/')).map(path => path.split('/')[0]!))
    expect([...folders].filter(folder => !folder.startsWith('.') && !(TOP_FOLDERS as readonly string[]).includes(folder))).toEqual([])
  })

  it('has nothing where the framework would import it without being asked', () => {
    expect(files.filter(path => /^(?:server|app|shared)\/utils\//.test(path))).toEqual([])
  })

  it('has no file whose name says nothing', () => {
    expect(files.filter(path => /^(?:utils?|helpers?|misc|common|manager|data|info|process|handle)$/.test(baseName(path)))).toEqual([])
  })

  it('reads the environment in one place', () => {
    const readers = sources.filter(({ path, text }) => /^(?:app|server|shared|fitting|modules)\//.test(path) && /\bprocess\s*(?:\.\s*env\b|\[\s*['"]env['"])|\bimport\.meta\.env\b/.test(text))
    expect(readers.map(({ path }) => path).filter(path => path !== 'server/config/env.ts')).toEqual([])
  })
})

describe('suppressions', () => {
  it('carry their reason on the line', () => {
    expect(sources.flatMap(({ path, text }) => unexplainedSuppressions(text).map(line => `${path}:${line}`))).toEqual([])
  })

  it.each([
    '/* eslint-disable */',
    '// eslint-disable-next-line no-console',
    '// eslint-disable-next-line no-console -- x',
    '<!-- eslint-disable vue/no-v-html -->',
    '// @ts-ignore',
    '// @ts-expect-error',
    '// @ts-nocheck',
    '/* v8 ignore next */',
  ])('without one are seen: %s', (line) => {
    expect(unexplainedSuppressions(`const a = 1\n${line}\nconst b = 2`)).toEqual([2])
  })

  it.each([
    '// eslint-disable-next-line no-console -- the command speaks to its user here',
    '// @ts-expect-error the package ships no types for this entry',
    '<!-- eslint-disable-next-line vue/no-v-html -- the drawing is made by the server -->',
  ])('with one are taken: %s', (line) => {
    expect(unexplainedSuppressions(line)).toEqual([])
  })
})

describe('tests', () => {
  const tests = sources.filter(({ path }) => path.startsWith('tests/') && path.endsWith('.test.ts'))

  it('are never skipped, focused or left to do', () => {
    const unfinished = /\b(?:it|test|describe)\s*\.\s*(?:skip|only|todo|fails|skipIf|runIf)\b|\bx(?:it|describe)\s*\(/
    expect(tests.filter(({ path, text }) => path !== 'tests/architecture/layout.test.ts' && unfinished.test(text)).map(({ path }) => path)).toEqual([])
  })

  it('draw no number that is not seeded', () => {
    expect(tests.filter(({ text }) => text.includes(`Math.${'random'}`)).map(({ path }) => path)).toEqual([])
  })
})
