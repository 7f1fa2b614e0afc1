import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import * as batches from '../../../../shared/schemas/batches'
import * as fits from '../../../../shared/schemas/fits'
import * as ids from '../../../../shared/schemas/ids'
import * as mail from '../../../../shared/schemas/mail'
import { parseBy } from '../../../../shared/schemas/parse'
import * as people from '../../../../shared/schemas/people'
import * as targets from '../../../../shared/schemas/targets'

const ID = 'abcdefghijklmnopqrstuvwxyz'
const modules: Record<string, unknown>[] = [batches, fits, ids, mail, people, targets]
const SCHEMAS = modules.flatMap(module => Object.entries(module)).filter((entry): entry is [string, z.ZodType] => entry[1] instanceof z.ZodType)

describe.each(SCHEMAS)('%s', (_name, schema) => {
  it('takes or refuses whatever comes, and refuses with a path and a reason', () => {
    fc.assert(fc.property(fc.anything({ maxDepth: 3, withNullPrototype: true }), (input) => {
      const parsed = parseBy(schema, input)
      if (!parsed.ok) expect(parsed.fields.length > 0 && parsed.fields.every(field => field.reason.length > 2)).toBe(true)
    }), { seed: 11, numRuns: 200 })
  })

  it('refuses null, a list and an empty text', () => {
    for (const input of [null, [], '', ' ']) expect(parseBy(schema, input).ok).toBe(false)
  })
})

describe('a field that cannot be used is named', () => {
  it.each<[string, z.ZodType, unknown, string]>([
    ['an address without a host', people.signInSchema, { email: 'ossian', password: 'x' }, 'email'],
    ['a short password', people.acceptInvitationSchema, { email: 'a@example.org', displayName: 'A', password: 'short' }, 'password'],
    ['a very long password', people.acceptInvitationSchema, { email: 'a@example.org', displayName: 'A', password: 'x'.repeat(201) }, 'password'],
    ['a name of blanks', people.changeNameSchema, { displayName: '   ' }, 'displayName'],
    ['a role that is a word', people.changeRolesSchema, { isObserver: 'yes', isAdministrator: false, coordinatorOf: [] }, 'isObserver'],
    ['an id that is none', people.changeRolesSchema, { isObserver: true, isAdministrator: false, coordinatorOf: ['1'] }, 'coordinatorOf.0'],
    ['a kind that is none', batches.uploadQuerySchema, { fileName: 'a.csv', kind: 'spectroscopic' }, 'kind'],
    ['a file without a name', batches.uploadQuerySchema, { fileName: ' ', kind: 'relative' }, 'fileName'],
    ['a cell that is a number', batches.mendRowSchema, { cells: { rho_arcsec: 0.94 } }, 'cells.rho_arcsec'],
    ['a ruling without a reason', fits.ruleSchema, { decision: 'accept', reason: '  ' }, 'reason'],
    ['a decision that is none', fits.ruleSchema, { decision: 'maybe', reason: 'looks good' }, 'decision'],
    ['a set-aside without a reason', fits.requestFitSchema, { setAside: [{ measureId: ID, reason: '' }] }, 'setAside.0.reason'],
    ['a target without a name', targets.createTargetSchema, { programmeId: ID, kind: 'relative', name: '' }, 'name'],
    ['a scale of zero', targets.createTargetSchema, { programmeId: ID, kind: 'plane', name: 'Sun', diameterScaleArcmin: 0 }, 'diameterScaleArcmin'],
    ['a scale without end', targets.createTargetSchema, { programmeId: ID, kind: 'plane', name: 'Sun', diameterScaleArcmin: Infinity }, 'diameterScaleArcmin'],
    ['a rule that is not a whole number', targets.createProgrammeSchema, { name: 'A', leastMeasures: 1.5 }, 'leastMeasures'],
    ['a page of no rows', ids.pageQuerySchema, { limit: '0' }, 'limit'],
    ['a page of an empty number', ids.pageQuerySchema, { limit: '' }, 'limit'],
  ])('%s', (_what, schema, input, path) => {
    const parsed = parseBy(schema, input)
    expect(parsed.ok ? [] : parsed.fields.map(field => field.path)).toContain(path)
  })

  it('and one that is missing is said to be missing', () => {
    expect(parseBy(people.signInSchema, { email: 'a@example.org' })).toEqual({ ok: false, fields: [{ path: 'password', reason: 'is missing' }] })
  })
})

describe('what a schema takes', () => {
  it('is trimmed and lowered, and unknown fields are dropped', () => {
    const parsed = parseBy(people.acceptInvitationSchema, { email: 'Mirelle@Example.org', displayName: ' Mirelle Tasque ', password: 'a long password', isAdministrator: true })
    expect(parsed).toEqual({ ok: true, value: { email: 'mirelle@example.org', displayName: 'Mirelle Tasque', password: 'a long password' } })
  })

  it('does not let a name of the language in by the back door', () => {
    const parsed = parseBy(batches.mendRowSchema, JSON.parse('{"cells":{"__proto__":"x","rho_arcsec":"0.94"}}'))
    expect(parsed.ok && Object.getPrototypeOf(parsed.value)).toBe(Object.prototype)
    expect(({} as Record<string, unknown>).rho_arcsec).toBeUndefined()
  })
})
