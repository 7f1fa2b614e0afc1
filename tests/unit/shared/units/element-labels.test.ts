import { describe, expect, it } from 'vitest'
import { ELEMENT_LABELS, elementFamily, labelledElements } from '../../../../shared/units/element-labels'

const element = (value: number) => ({ value, sigma: null, sigmaFormal: null, sigmaScaled: null, unit: '' })

describe('the labels of elements', () => {
  it('put the elements into reading order, whatever order they come in', () => {
    const labelled = labelledElements({ eccentricity: element(0.5), period: element(62) }, 'relative')
    expect(labelled.map(({ label, element: { value } }) => [label.symbol, value])).toEqual([['P', 62], ['e', 0.5]])
  })

  it('lose no element that has no label of its own', () => {
    const labelled = labelledElements({ massSum: element(1.2), node: element(3) }, 'relative')
    expect(labelled.map(({ label }) => label.word)).toEqual(['node', 'mass sum'])
  })

  it('are those of straight motion where the model is a line', () => {
    expect(elementFamily({ kind: 'relative', model: 'line' })).toBe('line')
    expect(elementFamily({ kind: 'plane', model: 'kepler' })).toBe('plane')
  })

  it('name no element twice', () => {
    for (const labels of Object.values(ELEMENT_LABELS)) expect(new Set(labels.map(label => label.name)).size).toBe(labels.length)
  })
})
