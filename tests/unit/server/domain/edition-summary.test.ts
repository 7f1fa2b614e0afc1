import { describe, expect, it } from 'vitest'
import { editionSummary } from '../../../../server/domain/edition-summary'
import { element, pairResult, planeResult } from '../../../builders/fit-result'

describe('editionSummary', () => {
  it('gives period, eccentricity and semi-major axis of a pair', () => {
    expect(editionSummary(pairResult())).toBe('P 62.41 ± 0.38 yr, e 0.4820, a 0.8610″')
  })

  it('gives eccentricity, parameter and the direction of periapsis in the plane', () => {
    expect(editionSummary(planeResult())).toBe('e 0.01650 ± 0.00090, p 0.99970 ± 0.00080 au, periapsis toward 103.4 ± 3.1°')
  })

  it('says of a straight motion that it is no orbit', () => {
    expect(editionSummary(pairResult({}, { model: 'line' }))).toBe('Motion so far straight')
  })

  it('leaves out what was not determined', () => {
    expect(editionSummary(planeResult({ periapsisDirection: undefined, semiLatusRectum: element(1.5, null, 'unit') }))).toBe('e 0.01650 ± 0.00090, p 1.5 unit')
  })
})
