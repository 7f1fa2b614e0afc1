import { describe, expect, it } from 'vitest'
import { changeOfRefit, usedIdsOf } from '../../../../app/components/fit/change-of-refit'
import { element, pairResult, residual } from '../../../builders/fit-result'

const resultOf = (elements: Record<string, ReturnType<typeof element>>, ids: string[]) => pairResult(elements, { residuals: ids.map(id => residual(id, {})) })
const beforeOf = (result: ReturnType<typeof resultOf>) => ({ number: 1, elements: result.elements, usedIds: usedIdsOf(result) })

describe('how far elements moved by a refit', () => {
  it('takes the variance with fewer measures less that with more, as the shared ones cancel', () => {
    const more = resultOf({ period: element(60, 3, 'yr') }, ['a', 'b', 'c'])
    const fewer = resultOf({ period: element(68, 5, 'yr') }, ['a', 'b'])
    expect(changeOfRefit(beforeOf(more), fewer).period).toBeCloseTo(2, 12)
    expect(changeOfRefit(beforeOf(fewer), more).period).toBeCloseTo(-2, 12)
  })

  it('says nothing where fewer measures seem to determine an element better: two orbits too different to be compared so', () => {
    const more = resultOf({ period: element(60, 5, 'yr') }, ['a', 'b', 'c'])
    const fewer = resultOf({ period: element(68, 3, 'yr') }, ['a', 'b'])
    expect(changeOfRefit(beforeOf(more), fewer).period).toBeNull()
  })

  it('adds the variances where each fit has a measure that the other has not', () => {
    const one = resultOf({ eccentricity: element(0.4, 0.03, '') }, ['a', 'b'])
    const other = resultOf({ eccentricity: element(0.5, 0.04, '') }, ['a', 'c'])
    expect(changeOfRefit(beforeOf(one), other).eccentricity).toBeCloseTo(2, 12)
  })

  it('takes the short way round for angles', () => {
    const one = resultOf({ node: element(359, 3, 'deg') }, ['a'])
    const other = resultOf({ node: element(4, 4, 'deg') }, ['b'])
    expect(changeOfRefit(beforeOf(one), other).node).toBeCloseTo(1, 12)
  })
})
