import { describe, expect, it } from 'vitest'
import { resultTitle } from '../../../../shared/units/result-title'

describe('the heading of a result', () => {
  it('never calls straight motion an orbit', () => {
    expect(resultTitle({ conic: null, model: 'line' })).toBe('Motion so far straight')
    expect(resultTitle({ conic: null, model: 'still' })).toBe('No motion seen so far')
  })
})
