import { describe, expect, it } from 'vitest'
import { safeNext } from '../../../../app/composables/useNextAddress'

describe('where sign-in leads to', () => {
  it('an address inside the site is kept with its query', () => {
    expect(safeNext('/targets/abc?fit=1')).toBe('/targets/abc?fit=1')
  })

  it.each(['https://elsewhere.example', '//elsewhere.example', '/\\elsewhere.example', 'javascript:alert(1)', '', undefined, ['/desk']])(
    '%s leads to the front page', next => expect(safeNext(next)).toBe('/'),
  )
})
