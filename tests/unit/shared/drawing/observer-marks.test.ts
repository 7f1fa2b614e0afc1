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

  it('outlines a mark about its point, the same wherever it stands', () => {
    expect(markPath('square', 5)).toBe('M0 0m-4.4 -4.4h8.8v8.8h-8.8z')
    for (const shape of MARK_SHAPES) expect(markPath(shape, 4, 12.5, -3).replace('M12.5 -3', 'M0 0')).toBe(markPath(shape, 4))
  })

  it('leaves most shapes open, so that marks on top of each other stay readable', () => {
    expect(MARK_SHAPES.filter(isFilledShape)).toEqual(['circle', 'triangle'])
  })
})
