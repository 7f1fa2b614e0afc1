import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { axisTicks, roundStep, ticksEvery } from '../../../../shared/drawing/axis-ticks'

describe('axis ticks', () => {
  it('stands on round values inside the axis', () => {
    expect(axisTicks(1976.1, 2040.2, 8).values).toEqual([1980, 1990, 2000, 2010, 2020, 2030, 2040])
    expect(axisTicks(-0.034, 0.041, 5)).toEqual({ values: [-0.02, 0, 0.02, 0.04], step: 0.02, decimals: 2 })
  })

  it('never gives more ticks than asked for, and none outside the axis', () => {
    fc.assert(fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.double({ min: 1e-6, max: 1e6, noNaN: true }), fc.integer({ min: 2, max: 12 }), (least, span, atMost) => {
      const { values, step } = axisTicks(least, least + span, atMost)
      expect(values.length).toBeLessThanOrEqual(atMost)
      for (const value of values) {
        expect(value).toBeGreaterThanOrEqual(least - 1e-6 * step - 1e-9 * Math.abs(least))
        expect(value).toBeLessThanOrEqual(least + span + 1e-6 * step + 1e-9 * Math.abs(least))
      }
    }))
  })

  it('rounds a step up to 1, 2 or 5 times a power of ten', () => {
    expect([0.031, 0.2, 1.01, 4.7, 61].map(roundStep)).toEqual([0.05, 0.2, 2, 5, 100])
  })

  it('gives whole multiples of a stated step', () => {
    expect(ticksEvery(-170, 190, 90).values).toEqual([-90, 0, 90, 180])
  })

  it('refuses an axis without a span', () => {
    expect(() => axisTicks(3, 3, 5)).toThrow(RangeError)
    expect(() => roundStep(0)).toThrow(RangeError)
  })
})
