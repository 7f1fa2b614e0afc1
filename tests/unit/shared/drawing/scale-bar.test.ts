import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { scaleBar } from '../../../../shared/drawing/scale-bar'

describe('scale bar', () => {
  it('is the longest round length that fits', () => {
    expect(scaleBar(350.2, 190)).toMatchObject({ length: 0.5, decimals: 1 })
    expect(scaleBar(12, 190)).toMatchObject({ length: 10, lengthPx: 120, decimals: 0 })
  })

  it('is never longer than allowed and never shorter than two fifths of it', () => {
    fc.assert(fc.property(fc.double({ min: 1e-4, max: 1e6, noNaN: true }), (pxPerUnit) => {
      const { lengthPx } = scaleBar(pxPerUnit, 200)
      expect(lengthPx).toBeLessThanOrEqual(200.001)
      expect(lengthPx).toBeGreaterThan(200 * 0.4 - 0.001)
    }))
  })

  it('refuses a drawing without a scale', () => {
    expect(() => scaleBar(0, 200)).toThrow(RangeError)
  })
})
