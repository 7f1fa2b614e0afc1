import { describe, expect, it } from 'vitest'
import { boxOf, countWithin, emptiestBox, labelPoints, placeLabel } from '../../../../shared/drawing/label-place'

const middleOf = (label: Parameters<typeof boxOf>[0]) => {
  const box = boxOf(label)
  return { x: (box.left + box.right) / 2, y: (box.top + box.bottom) / 2 }
}
const empty = { sizePx: 560, obstacles: [] }

describe('labels of a drawing', () => {
  it('stand away from the middle of the drawing where nothing is in the way', () => {
    expect(middleOf(placeLabel({ x: 400, y: 280 }, { x: 280, y: 280 }, ['2031'], empty)).x).toBeGreaterThan(400)
    expect(middleOf(placeLabel({ x: 160, y: 280 }, { x: 280, y: 280 }, ['2031'], empty)).x).toBeLessThan(160)
    expect(middleOf(placeLabel({ x: 280, y: 100 }, { x: 280, y: 280 }, ['2031'], empty)).y).toBeLessThan(100)
  })

  it('stay on the paper, for the larger letters of a phone too', () => {
    for (const [x, y] of [[545, 280], [8, 280], [280, 6], [280, 554], [550, 550]] as const) {
      const box = boxOf(placeLabel({ x, y }, { x: 280, y: 280 }, ['periastron', '2009.33'], empty), 9.6)
      expect(box.left).toBeGreaterThanOrEqual(0)
      expect(box.right).toBeLessThanOrEqual(560)
      expect(box.top).toBeGreaterThanOrEqual(0)
      expect(box.bottom).toBeLessThanOrEqual(560)
    }
  })

  it('step aside for what already stands there', () => {
    const first = placeLabel({ x: 400, y: 280 }, { x: 280, y: 280 }, ['2031'], empty)
    const second = placeLabel({ x: 400, y: 280 }, { x: 280, y: 280 }, ['2032'], { sizePx: 560, obstacles: labelPoints(first) })
    expect(countWithin(boxOf(second), labelPoints(first))).toBe(0)
  })

  it('leave the compass and the scale bar the emptiest corner, the first of equal ones', () => {
    const boxes = [{ left: 0, right: 10, top: 0, bottom: 10 }, { left: 20, right: 30, top: 0, bottom: 10 }]
    expect(emptiestBox(boxes, [])).toBe(0)
    expect(emptiestBox(boxes, [{ x: 5, y: 5 }])).toBe(1)
  })
})
