import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  chiSquareQuantile, chiSquareShares, fQuantile, fShares, normalQuantile, normalShares, studentQuantile, studentShares,
} from '../../../../fitting/uncertainty/distributions'

const runs = { seed: 13, numRuns: 1500 }
const probability = fc.oneof(fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }), fc.double({ min: -12, max: -2, noNaN: true }).map(x => 10 ** x))
const degrees = fc.oneof(fc.integer({ min: 1, max: 3000 }), fc.double({ min: 0.5, max: 50, noNaN: true }))

describe('distribution functions', () => {
  it('split all probability between the two tails', () => {
    fc.assert(fc.property(degrees, degrees, fc.double({ min: 0, max: 100, noNaN: true }), (k1, k2, x) => {
      for (const { lower, upper } of [chiSquareShares(x, k1), fShares(x, k1, k2), normalShares(x), studentShares(-x, k1)]) {
        expect(lower).toBeGreaterThanOrEqual(0)
        expect(upper).toBeGreaterThanOrEqual(0)
        expect(Math.abs(lower + upper - 1)).toBeLessThanOrEqual(4e-16)
      }
    }), runs)
  })

  it('exchange tails when F is inverted', () => {
    fc.assert(fc.property(degrees, degrees, fc.double({ min: 1e-3, max: 1e3, noNaN: true }), (k1, k2, x) => {
      expect(Math.abs(fShares(x, k1, k2).lower - fShares(1 / x, k2, k1).upper)).toBeLessThanOrEqual(5e-14)
    }), runs)
  })

  it('give exp(−x/2) above x for χ² of two degrees of freedom', () => {
    for (const x of [0, 1e-8, 0.3, 2, 40, 600]) expect(Math.abs(chiSquareShares(x, 2).upper / Math.exp(-x / 2) - 1)).toBeLessThanOrEqual(1e-13)
  })

  it('give the Cauchy distribution for Student\'s t of one degree of freedom', () => {
    for (const x of [-50, -1, 0, 0.2, 3]) expect(Math.abs(studentShares(x, 1).lower - (0.5 + Math.atan(x) / Math.PI))).toBeLessThanOrEqual(3e-16)
  })

  it.each([
    ['a negative χ²', () => chiSquareShares(-1, 3)], ['no degrees of freedom', () => chiSquareShares(1, 0)], ['NaN', () => chiSquareShares(NaN, 2)],
    ['a negative F', () => fShares(-1, 2, 2)], ['F without degrees of freedom', () => fShares(1, 2, 0)], ['NaN as t', () => studentShares(NaN, 3)],
    ['NaN as z', () => normalShares(NaN)],
  ])('answer NaN for %s', (_, shares) => {
    expect(shares()).toEqual({ lower: NaN, upper: NaN })
  })

  it('reach 0 and 1 at the ends', () => {
    expect(chiSquareShares(Infinity, 5)).toEqual({ lower: 1, upper: 0 })
    expect(fShares(Infinity, 5, 7)).toEqual({ lower: 1, upper: 0 })
    expect(normalShares(-Infinity)).toEqual({ lower: 0, upper: 1 })
    expect(studentShares(Infinity, 4)).toEqual({ lower: 1, upper: 0 })
  })
})

describe('quantiles', () => {
  it('are the inverse of the distribution functions', () => {
    fc.assert(fc.property(probability, degrees, degrees, (p, k1, k2) => {
      const back = [
        chiSquareShares(chiSquareQuantile(p, k1), k1), fShares(fQuantile(p, k1, k2), k1, k2), normalShares(normalQuantile(p)),
        studentShares(studentQuantile(p, k1), k1),
      ]
      for (const { lower } of back) expect(Math.abs(lower / p - 1)).toBeLessThanOrEqual(2e-11)
    }), runs)
  })

  it('are symmetric for the normal and Student\'s distributions', () => {
    for (const p of [0.001, 0.2, 0.25, 0.4, 0.499]) {
      expect(normalQuantile(p)).toBeCloseTo(-normalQuantile(1 - p), 12)
      expect(studentQuantile(p, 4.5)).toBeCloseTo(-studentQuantile(1 - p, 4.5), 12)
    }
    expect(normalQuantile(0.5)).toBe(0)
    expect(studentQuantile(0.5, 3)).toBe(0)
  })

  it('are infinite or 0 at the ends and NaN outside', () => {
    expect([chiSquareQuantile(0, 3), chiSquareQuantile(1, 3), normalQuantile(0), normalQuantile(1)]).toEqual([0, Infinity, -Infinity, Infinity])
    expect([chiSquareQuantile(-0.1, 3), fQuantile(1.1, 2, 2), normalQuantile(NaN), normalQuantile(2), studentQuantile(0.3, 0), chiSquareQuantile(0.5, -1)]).toEqual([NaN, NaN, NaN, NaN, NaN, NaN])
  })
})
