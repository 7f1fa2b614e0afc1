import { expect, test } from 'vitest'
import { maskedPath } from '../../../../server/http/masked-path'
import { makeIds } from '../../../../server/context/ids'

const { newId, newToken } = makeIds()

test('the log holds no secret of a link, no id and no query', () => {
  expect(maskedPath(`/invitation/${newToken()}`)).toBe('/invitation/:id')
  expect(maskedPath(`/api/v1/targets/${newId()}/fits?q=Orrowin`)).toBe('/api/v1/targets/:id/fits')
  expect(maskedPath(`/orbits/${newId()}/3`)).toBe('/orbits/:id/3')
  expect(maskedPath('/sign-in#next')).toBe('/sign-in')
  expect(maskedPath(`/x/${'A'.repeat(61)}`)).toBe('/x/:id')
})
