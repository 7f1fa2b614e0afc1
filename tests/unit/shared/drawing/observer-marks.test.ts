import { describe, expect, it } from 'vitest'
import { isFilledShape, markPath, MARK_SHAPES, observerMarks } from '../../../../shared/drawing/observer-marks'

describe('observer marks', () => {
  it('gives each of the first forty observers a pair of shape and hue of its own', () => {
    const marks = observerMarks(Array.from({ length: 40 }, (_, index) => `observer ${index}`))
    expect(new Set(marks.map(mark => `${mark.shape}/${mark.hue}`)).size).toBe(40)
  })

  it('tells the first eight observers apart by shape alone, for red light and for print', () => {
    const marks = observerMarks(Array.from({ length: 8 }, (_, index) => `observer ${index}`))
    expect(new Set(marks.map(mark => mark.shape)).size).toBe(8)
  })

  it('does not depend on the order in which measures come', () => {
    const names = ['R. Quellmann', 'Ossian Brandvik', 'R. Quellmann', 'Mirelle Tasque']
    expect(observerMarks(names)).toEqual(observerMarks([...names].reverse()))
  })

  it('counts the measures of each observer', () => {
    expect(observerMarks(['b', 'a', 'b']).map(({ observer, measures }) => [observer, measures])).toEqual([['a', 1], ['b', 2]])
  })

  it('outlines every shape within one and a third times its half-size', () => {
    for (const shape of MARK_SHAPES) {
      const numbers = markPath(shape, 4).match(/-?\d+(\.\d+)?/g)!.map(Number).filter(value => shape !== 'circle' || Math.abs(value) <= 4)
      expect(Math.max(...numbers.map(Math.abs)), shape).toBeLessThanOrEqual(4 * 1.34)
    }
  })

  it('leaves most shapes open, so that marks on top of each other stay readable', () => {
    expect(MARK_SHAPES.filter(isFilledShape)).toEqual(['circle', 'triangle'])
  })
})
