import { describe, expect, it } from 'vitest'
import { alternativeSentence, linkMeasures, nameOfMeasure } from '../../../../shared/units/warning-text'
import { element, pairResult } from '../../../builders/fit-result'

const id = 'abcdefghijklmnopqrstuvwxyz'
const measure = { id, observer: 'T. Orrowin', epochYr: 1998.4123, phiDeg: null }

describe('sentences of the engine for people', () => {
  it('name a measure by epoch and observer where the engine names it by id', () => {
    expect(linkMeasures(`One measure lies more than 6 σ off: ${id}.`, [measure])).toEqual([
      { text: 'One measure lies more than 6 σ off: ', measureId: null }, { text: '1998.412, T. Orrowin', measureId: id }, { text: '.', measureId: null },
    ])
  })

  it('leave a sentence without ids as it is', () => {
    expect(linkMeasures('The orbit is a circle to rounding.', [measure])).toEqual([{ text: 'The orbit is a circle to rounding.', measureId: null }])
  })

  it('name a measure without a time by its direction', () => {
    expect(nameOfMeasure({ ...measure, epochYr: null, phiDeg: 103.42 })).toBe('φ 103.4°, T. Orrowin')
  })

  it('tell another orbit by its period, eccentricity and axis', () => {
    const other = { deltaChiSquare: 2.13, elements: { period: element(188, 21, 'yr'), semiMajorAxis: element(1.2, 0.1, 'arcsec'), inclination: element(40, 2, 'deg') } }
    expect(alternativeSentence(other, pairResult())).toBe('Another orbit fits with Δχ² 2.1: P 188 ± 21 yr, a 1.20 ± 0.10″.')
  })
})
