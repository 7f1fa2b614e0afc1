import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { earthHeliocentric, sunBarycentric, sunBarycentricVelocity } from '../../../../fitting/earth'
import { EARTH_TERMS } from '../../../../fitting/earth/epv-earth-terms'
import { SUN_TERMS } from '../../../../fitting/earth/epv-sun-terms'

const runs = { seed: 31, numRuns: 300 }
const jdOfSeries = fc.double({ min: 2415020.5, max: 2488070.5, noNaN: true })

function stateAt(evaluate: (jdTt: number, out: Float64Array) => void, jdTt: number): Float64Array {
  const out = new Float64Array(6)
  evaluate(jdTt, out)
  return out
}

describe('the heliocentric Earth', () => {
  it('has the number of terms of its source', () => {
    const count = (terms: typeof EARTH_TERMS) => terms.flat().reduce((sum, numbers) => sum + numbers.length / 3, 0)
    expect([count(EARTH_TERMS), count(SUN_TERMS)]).toEqual([1323, 628])
  })

  it('stays between 0.983 and 1.017 au of the Sun, at 0.0168 to 0.0177 au a day', () => {
    fc.assert(fc.property(jdOfSeries, (jd) => {
      const [x = NaN, y = NaN, z = NaN, vx = NaN, vy = NaN, vz = NaN] = stateAt(earthHeliocentric, jd)
      const distance = Math.hypot(x, y, z)
      const speed = Math.hypot(vx, vy, vz)
      expect(distance).toBeGreaterThan(0.983)
      expect(distance).toBeLessThan(1.017)
      expect(speed).toBeGreaterThan(0.0168)
      expect(speed).toBeLessThan(0.0177)
    }), runs)
  })

  it.each([['the Earth', earthHeliocentric], ['the Sun', sunBarycentric]] as const)('moves as its velocity says: %s', (_, evaluate) => {
    const step = 1 / 8
    fc.assert(fc.property(fc.integer({ min: 2415021, max: 2488070 }), (jd) => {
      const velocity = stateAt(evaluate, jd)
      // Five-point derivative; whole eighths of a day are exact in a Julian date.
      const [p2, p1, m1, m2] = [2 * step, step, -step, -2 * step].map(shift => stateAt(evaluate, jd + shift))
      for (let k = 0; k < 3; k++) {
        const slope = (m2![k]! - 8 * m1![k]! + 8 * p1![k]! - p2![k]!) / (12 * step)
        expect(Math.abs(slope - velocity[k + 3]!)).toBeLessThan(1e-12)
      }
    }), runs)
  })

  it('is nowhere at a time that is no number', () => {
    for (const jd of [NaN, Infinity, -Infinity]) expect([...stateAt(earthHeliocentric, jd)].every(Number.isNaN)).toBe(true)
  })
})

describe('the Sun about the barycentre', () => {
  it('keeps within 0.0102 au of it and gives its velocity alone as within its state', () => {
    fc.assert(fc.property(jdOfSeries, (jd) => {
      const state = stateAt(sunBarycentric, jd)
      const velocity = new Float64Array(3)
      sunBarycentricVelocity(jd, velocity)
      expect(Math.hypot(state[0]!, state[1]!, state[2]!)).toBeLessThan(0.0102)
      expect([...velocity]).toEqual([...state.slice(3)])
    }), runs)
  })
})
