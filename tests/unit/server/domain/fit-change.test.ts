import { describe, expect, it } from 'vitest'
import { changeInSigma } from '../../../../server/domain/fit-change'
import { element, pairResult, residual } from '../../../builders/fit-result'

const residuals = (...ids: string[]) => ids.map(id => residual(id, {}))

describe('the change between two fits', () => {
  it('is measured against √(σ_old² − σ_new²) where the new one holds the measures of the old', () => {
    const older = pairResult({ period: element(62, 0.5, 'yr') }, { residuals: residuals('a', 'b') })
    const newer = pairResult({ period: element(62.8, 0.3, 'yr') }, { residuals: residuals('a', 'b', 'c') })
    expect(changeInSigma(older, newer).period).toBeCloseTo(0.8 / 0.4, 12)
  })

  it('is measured against √(σ_old² + σ_new²) where a measure of the old one is not used any more', () => {
    const older = pairResult({ period: element(62, 0.4, 'yr') }, { residuals: residuals('a', 'b') })
    const newer = pairResult({ period: element(62.5, 0.3, 'yr') }, { residuals: [residual('a', {}), residual('b', {}, { status: 'set-aside' })] })
    expect(changeInSigma(older, newer).period).toBeCloseTo(0.5 / 0.5, 12)
  })

  it('is unknown where the new error is not smaller, where an error is missing and where only one fit has the element', () => {
    const older = pairResult({ period: element(62, 0.3, 'yr'), eccentricity: element(0.4, null, '') }, { residuals: residuals('a') })
    const newer = pairResult({ period: element(62.5, 0.4, 'yr'), eccentricity: element(0.5, 0.01, ''), nextPeriastronTime: element(2071, 1, 'yr') }, { residuals: residuals('a', 'b') })
    expect(changeInSigma(older, newer)).toMatchObject({ period: null, eccentricity: null, nextPeriastronTime: null })
  })

  it('takes angles the short way round, by half turns where the ascending node is not known', () => {
    const older = pairResult({ node: element(179, 2, 'deg'), argumentOfPeriastron: element(350, 2, 'deg') }, { residuals: residuals('a') })
    const newer = pairResult({ node: element(1, 1, 'deg'), argumentOfPeriastron: element(172, 1, 'deg') }, { residuals: residuals('a', 'b') })
    const change = changeInSigma(older, newer)
    expect(change.node).toBeCloseTo(2 / Math.sqrt(3), 12)
    expect(change.argumentOfPeriastron).toBeCloseTo(2 / Math.sqrt(3), 12)
    const known = changeInSigma({ ...older, nodeStatus: 'ascending' }, { ...newer, nodeStatus: 'ascending' })
    expect(known.node).toBeCloseTo(-178 / Math.sqrt(3), 12)
  })

  it('takes a passage and the next one as the same', () => {
    const older = pairResult({ period: element(60, 0.5, 'yr'), periastronTime: element(2009, 0.2, 'yr') }, { residuals: residuals('a') })
    const newer = pairResult({ period: element(60, 0.3, 'yr'), periastronTime: element(2069.1, 0.1, 'yr') }, { residuals: residuals('a', 'b') })
    expect(changeInSigma(older, newer).periastronTime).toBeCloseTo(0.1 / Math.sqrt(0.03), 9)
  })
})
