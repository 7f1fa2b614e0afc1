import { describe, expect, it } from 'vitest'
import { resultDetail, resultTitle } from '../../../../shared/units/result-title'
import { element, pairResult, solarResult } from '../../../builders/fit-result'

const conic = { class: 'hyperbola' as const, semiLatusRectum: element(1.77, 0.001, 'au'), eccentricity: element(1.0001, 0.0002, ''), probabilityBound: 0.2, parabolaExcluded: false, circleExcluded: true, statement: 'Hyperbola: probability of being bound 0.2; a parabola is not excluded' }

describe('the heading of a result', () => {
  it('never calls straight motion an orbit', () => {
    expect(resultTitle({ conic: null, kind: 'relative', model: 'line' })).toBe('Motion so far straight')
    expect(resultTitle({ conic: null, kind: 'relative', model: 'still' })).toBe('No motion seen so far')
  })

  it('is the whole statement for a pair, which then needs no more words', () => {
    const pair = pairResult({}, { conic: { ...conic, class: 'ellipse', statement: 'Ellipse, bound by construction' } })
    expect(resultTitle(pair)).toBe('Ellipse, bound by construction')
    expect(resultDetail(pair)).toBeNull()
  })

  it('does not name a class that is not settled about the Sun, and gives the statement beside it', () => {
    expect(resultTitle(solarResult({}, { conic }))).toBe('Near a parabola, not settled yet')
    expect(resultDetail(solarResult({}, { conic }))).toBe(conic.statement)
    expect(resultTitle(solarResult({}, { conic: { ...conic, parabolaExcluded: true } }))).toBe('Hyperbola')
  })
})
