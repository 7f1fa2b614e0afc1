import { describe, expect, it } from 'vitest'
import { editionSummary } from '../../../../server/domain/edition-summary'
import { element, pairResult, planeResult, solarResult } from '../../../builders/fit-result'

describe('editionSummary', () => {
  it('gives period, eccentricity and semi-major axis of a pair', () => {
    expect(editionSummary(pairResult())).toBe('P 62.41 ± 0.38 yr, e 0.4820, a 0.8610″')
  })

  it('gives eccentricity, parameter and the direction of periapsis in the plane', () => {
    expect(editionSummary(planeResult())).toBe('e 0.01650 ± 0.00090, p 0.99970 ± 0.00080 au, periapsis toward 103.4 ± 3.1°')
  })

  it('says of a straight motion that it is no orbit', () => {
    expect(editionSummary(pairResult({}, { model: 'line' }))).toBe('Motion so far straight')
    const elements = { motion: element(0.041, 0.0012, 'arcsec/yr'), motionDirection: element(231.2, 0.4, 'deg'), closestApproach: element(3.12, 0.05, 'arcsec'), closestApproachTime: element(2088.1, 2.3, 'Julian year') }
    expect(editionSummary({ ...pairResult({}, { model: 'line' }), elements })).toBe('Motion so far straight: 0.0410 ± 0.0012″/yr toward 231.20°, closest 3.120″ in 2088.1')
  })

  it('leaves out what was not determined', () => {
    expect(editionSummary(planeResult({ periapsisDirection: undefined, semiLatusRectum: element(1.5, null, 'unit') }))).toBe('e 0.01650 ± 0.00090, p 1.5 unit')
  })

  it('says of an orbit about the Sun whether it is bound, and over which arc it is honest', () => {
    const open = { class: 'ellipse' as const, semiLatusRectum: element(1.767, 0.001, 'au'), eccentricity: element(0.9987, 0.0021, ''), probabilityBound: 0.7, parabolaExcluded: false, circleExcluded: true, statement: '' }
    const { honestArc } = solarResult()
    expect(editionSummary(solarResult({}, { conic: open }))).toBe('q 0.88412 ± 0.00062 au, e 0.9987 ± 0.0021, parabola not excluded; honest over its 41-day arc')
    expect(editionSummary(solarResult({}, { conic: { ...open, parabolaExcluded: true }, honestArc: { ...honestArc!, standing: 'perturbed' } }))).toMatch(/ ± 0\.0021; with the planets over its 41-day arc$/)
  })
})
