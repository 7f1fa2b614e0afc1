import { describe, expect, it } from 'vitest'
import { ACCESS_KINDS } from '../../server/http/define-route'
import { resolveImport } from './resolve-import'
import { readRouteDefinition } from './route-definition'
import { readSources } from './source-files'

/** Routes that go through another door than defineRoute, each with its reason. */
const EXCEPTIONS: Record<string, string> = {}

const routes = readSources().filter(({ path }) => /^server\/(?:api|routes)\//.test(path))

describe('every route', () => {
  it('is made by defineRoute, with its access written out', () => {
    expect(routes.length).toBeGreaterThan(10)
    const wrong = routes.filter(({ path, text }) => {
      if (path in EXCEPTIONS) return false
      const { definer, from, access } = readRouteDefinition(text)
      const resolved = from ? resolveImport(from, path) : null
      const isOurs = definer === 'defineRoute' && resolved?.kind === 'file' && resolved.path === 'server/http/define-route.ts'
      return !isOurs || !(ACCESS_KINDS as readonly string[]).includes(access ?? '')
    })
    expect(wrong.map(({ path }) => path)).toEqual([])
  })

  it('lies in a folder of the API, or is one of the few plain addresses', () => {
    expect(routes.map(({ path }) => path).filter(path => path.startsWith('server/api/') && !path.startsWith('server/api/v1/') && path !== 'server/api/[...].ts')).toEqual([])
  })

  it('names an exception only where the file exists', () => {
    expect(Object.keys(EXCEPTIONS).filter(path => !routes.some(route => route.path === path))).toEqual([])
  })
})

describe('a route planted outside the rule', () => {
  it.each([
    ['an event handler', `import { defineEventHandler } from 'h3'\nexport default defineEventHandler(() => 1)`],
    ['a definer of the same name from elsewhere', `const defineRoute = (x: unknown) => x\nexport default defineRoute({ access: 'public' })`],
    ['no access', `import { defineRoute } from '../../http/define-route'\nexport default defineRoute({ handler: () => 1 })`],
    ['a computed access', `import { defineRoute } from '../../http/define-route'\nconst access = 'public'\nexport default defineRoute({ access, handler: () => 1 })`],
    ['no default export', `import { defineRoute } from '../../http/define-route'\nexport const route = defineRoute({ access: 'public', handler: () => 1 })`],
  ])('is told apart: %s', (_what, text) => {
    const { definer, from, access } = readRouteDefinition(text)
    expect(definer === 'defineRoute' && from === '../../http/define-route' && access !== null).toBe(false)
  })
})
