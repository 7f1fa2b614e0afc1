import { posix } from 'node:path'
import { describe, expect, it } from 'vitest'
import { findOffences } from './find-offences'
import { FILE_ONLY, plantsOf, relativeSpecifier } from './planted-offences'
import { readImports } from './read-imports'
import { ROOMS, roomOf } from './rooms'
import { readSources } from './source-files'

const BOUND_ROOMS = ROOMS.filter(room => !room.rooms.includes('*'))
const cases = BOUND_ROOMS.map(room => ({ name: room.name, place: room.places[0]! }))
/** Nobody may import the browser; the browser may not import the database. */
const forbiddenFileFor = (name: string) => (name === 'app' ? 'server/db/client.ts' : 'app/composables/useApi.ts')

describe('the import table', () => {
  it('is kept by every source file', () => {
    expect(readSources().flatMap(({ path, text }) => findOffences(path, text))).toEqual([])
  })

  it('has a sentence for every room that tells what it may import', () => {
    for (const { place } of cases) expect(findOffences(`${place}/planted.ts`, `import 'no-such-package'`).join()).toContain('may import')
  })

  it('gives a place in no room away', () => {
    expect(findOffences('server/utils/planted.ts', 'export {}')).toHaveLength(1)
    expect(findOffences('lib/planted.ts', 'export {}')).toHaveLength(1)
  })
})

describe.each(cases)('an offence planted in $name', ({ name, place }) => {
  const paths = { ts: `${place}/planted.ts`, vue: `${place}/Planted.vue` }

  it('is seen in every form, by relative path', () => {
    const missed = plantsOf(relativeSpecifier(paths.ts, forbiddenFileFor(name))).filter(plant => findOffences(paths[plant.extension], plant.text).length === 0)
    expect(missed.map(plant => plant.form)).toEqual([])
  })

  it('is seen in every form, by alias', () => {
    const missed = plantsOf(`~~/${forbiddenFileFor(name).replace('.ts', '')}`).filter(plant => plant.form !== 'reference' && findOffences(paths[plant.extension], plant.text).length === 0)
    expect(missed.map(plant => plant.form)).toEqual([])
  })

  it('is seen in every form, by the name of a package', () => {
    const plants = plantsOf('no-such-package').filter(plant => !FILE_ONLY.includes(plant.form))
    expect(plants.filter(plant => findOffences(paths[plant.extension], plant.text).length === 0).map(plant => plant.form)).toEqual([])
  })

  it('is seen where the path is computed', () => {
    const offences = findOffences(paths.ts, 'export const load = (name: string) => import(name)')
    expect(offences).toHaveLength(name === 'scripts' ? 0 : 1)
  })
})

describe('a permit for part of a room', () => {
  it.each([
    ['shared goes past the door of the engine', 'shared/units/planted.ts', `import { sin } from '../../fitting/elementary'`],
    ['a service calls the engine', 'server/services/fits/planted.ts', `import { fitOrbit } from '../../../fitting'`],
    ['a service takes all of the engine', 'server/services/fits/planted.ts', `import * as engine from '../../../fitting'`],
    ['a pure rule takes a value of the engine', 'server/domain/planted.ts', `import { predict } from '../../fitting'`],
    ['a repository opens a connection', 'server/repositories/planted.ts', `import { openDatabase } from '../db/client'`],
    ['a repository takes a value of shared', 'server/repositories/planted.ts', `import { nameKey } from '#shared/intake/name-key'`],
    ['the engine uses an alias', 'fitting/conic/planted.ts', `import { KINDS } from '~~/fitting/types'`],
    ['a migration leans on the schema', 'server/db/migrations/planted.ts', `import type { Database } from '../schema'`],
    ['a worker reaches the database', 'server/jobs/workers/planted.ts', `import { openDatabase } from '../../db/client'`],
    ['a service speaks HTTP without an import', 'server/services/fits/planted.ts', `export function refuse() { throw createError({ statusCode: 400 }) }`],
    ['a route speaks HTTP without an import', 'server/api/v1/planted.get.ts', `export default defineEventHandler(() => 1)`],
    ['shared reads the configuration without an import', 'shared/units/planted.ts', `export const dataDir = () => useRuntimeConfig().dataDir`],
    ['a service hashes with a slow function at hand', 'server/services/people/planted.ts', `import { scryptSync } from 'node:crypto'`],
  ])('does not cover the rest: %s', (_what, path, text) => {
    expect(findOffences(path, text)).toHaveLength(1)
  })

  it.each([
    ['shared/units/planted.ts', `import type { Element } from '../../fitting/types'\nimport { z } from 'zod'`],
    ['server/services/fits/planted.ts', `import { predict, type FitResult } from '../../../fitting'`],
    ['server/domain/planted.ts', `import type { FitResult } from '../../fitting'`],
    ['server/repositories/planted.ts', `import type { Database } from '../db/schema'\nimport { sql } from 'kysely'`],
    ['server/db/planted.ts', `import { migrations } from './migrations'`],
    ['app/components/Planted.vue', `<script setup lang="ts">\nimport { ref } from 'vue'\nimport Other from '~/components/ui/UiButton.vue'\nimport type { Kind } from '~~/fitting/types'\n</script>`],
    ['server/services/fits/planted.ts', `const createError = (text: string) => new Error(text)\nexport const refuse = () => createError('no')`],
    ['fitting/conic/planted.ts', `// import x from 'node:fs'\nexport const text = "import x from 'node:fs'"`],
    ['tests/unit/planted.test.ts', `import { openDatabase } from '../../server/db/client'\nimport 'anything'`],
  ])('covers what it names: %s', (path, text) => {
    expect(findOffences(path, text)).toEqual([])
  })
})

describe('scripts that run before the packages are installed', () => {
  const texts = new Map(readSources().map(({ path, text }) => [path, text]))
  const staticImportsOf = (path: string) => readImports(path, texts.get(path) ?? '').flatMap(({ form, specifier }) => (form === 'import()' || specifier === null ? [] : [specifier]))

  it.each(['scripts/demo.mjs', 'scripts/start.mjs', 'scripts/check.mjs', 'scripts/run-bundled.mjs'])('%s needs nothing but Node until it loads more', (entry) => {
    expect(texts.has(entry)).toBe(true)
    const visited = new Set([entry])
    for (const path of visited) {
      for (const specifier of staticImportsOf(path)) {
        expect(specifier, `${path} imports ${specifier}: load it with import() once it is installed`).toMatch(/^(?:node:|\.{1,2}\/.*\.mjs$)/)
        if (specifier.startsWith('.')) visited.add(posix.join(posix.dirname(path), specifier))
      }
    }
  })
})

describe('the rooms', () => {
  it('overlap nowhere: every place belongs to one room', () => {
    const places = ROOMS.flatMap(room => room.places)
    expect(new Set(places).size).toBe(places.length)
    for (const room of ROOMS) for (const place of room.places) expect(roomOf(`${place}/x.ts`)?.name === room.name || /\.\w+$/.test(place)).toBe(true)
  })

  it('permit only rooms that exist', () => {
    const names = new Set(['*', ...ROOMS.map(room => room.name)])
    expect(ROOMS.flatMap(room => room.rooms).map(permit => (typeof permit === 'string' ? permit : permit.room)).filter(name => !names.has(name))).toEqual([])
  })
})
