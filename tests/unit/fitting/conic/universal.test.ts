import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { stateAfter, stateFromElements, type StateVectors } from '../../../../fitting/conic'
import { stumpffInto } from '../../../../fitting/conic/stumpff'
import { moveInto } from '../../../../fitting/conic/universal'

const MU = 2.959122082855911e-4

/** Any conic, the body within 80 % of the way to the asymptote or apoapsis. */
const conic = fc.record({
  e: fc.oneof(fc.double({ min: 0, max: 4, noNaN: true }), fc.double({ min: -1e-9, max: 1e-9, noNaN: true }).map((x) => 1 + x), fc.constantFrom(0, 1)),
  q: fc.double({ min: 0.1, max: 3, noNaN: true }),
  part: fc.double({ min: -0.8, max: 0.8, noNaN: true }),
  angles: fc.tuple(fc.double({ min: 0, max: 3, noNaN: true }), fc.double({ min: 0, max: 6, noNaN: true }), fc.double({ min: 0, max: 6, noNaN: true })),
  days: fc.double({ min: -60, max: 60, noNaN: true }),
})

type Conic = typeof conic extends fc.Arbitrary<infer T> ? T : never

function stateOf({ e, q, part, angles }: Conic): StateVectors {
  const farthest = e <= 1 ? Math.PI : Math.acos(-1 / e)
  const [inclinationRad, nodeRad, argumentOfPeriapsisRad] = angles
  return stateFromElements({ semiLatusRectum: q * (1 + e), eccentricity: e, inclinationRad, nodeRad, argumentOfPeriapsisRad, trueAnomalyRad: part * farthest }, MU)
}

const flat = ({ place, velocity }: StateVectors) => Float64Array.of(...place, ...velocity)
const length = (a: ArrayLike<number>, from: number) => Math.hypot(a[from]!, a[from + 1]!, a[from + 2]!)
const apart = (a: ArrayLike<number>, b: ArrayLike<number>, from: number) => Math.hypot(a[from]! - b[from]!, a[from + 1]! - b[from + 1]!, a[from + 2]! - b[from + 2]!)

describe('Stumpff’s functions', () => {
  it('join without a step where the series ends and on both sides of the parabola', () => {
    const [a, b] = [new Float64Array(6), new Float64Array(6)]
    for (const x of [2.5, -2.5]) {
      stumpffInto(x, a)
      stumpffInto(x * (1 + 1e-15), b)
      for (let n = 0; n < 6; n++) expect(b[n]).toBeCloseTo(a[n]!, 14)
    }
    stumpffInto(0, a)
    expect(Array.from(a)).toEqual([1, 1, 1 / 2, 1 / 6, 1 / 24, 1 / 120])
  })
})

describe('motion by universal variables', () => {
  it('agrees with Kepler’s equation along every conic', () => {
    fc.assert(fc.property(conic, (c) => {
      const state = stateOf(c)
      const [out, expected] = [new Float64Array(6), flat(stateAfter(state, MU, c.days))]
      expect(moveInto(flat(state), MU, c.days, out)).toBe(true)
      expect(apart(out, expected, 0) / length(expected, 0)).toBeLessThan(1e-11)
      expect(apart(out, expected, 3) / length(expected, 3)).toBeLessThan(1e-11)
    }), { seed: 31, numRuns: 400 })
  })

  it('returns to its start', () => {
    fc.assert(fc.property(conic, (c) => {
      const start = flat(stateOf(c))
      const [out, back] = [new Float64Array(6), new Float64Array(6)]
      moveInto(start, MU, c.days, out)
      moveInto(out, MU, -c.days, back)
      const condition = Math.max(1, length(out, 0) / length(start, 0), length(start, 0) / length(out, 0))
      expect(apart(back, start, 0) / length(start, 0)).toBeLessThan(2e-14 * condition ** 2 * (1 + Math.abs(c.days) * length(start, 3) / length(start, 0)))
    }), { seed: 32, numRuns: 400 })
  })

  it('has the partial derivatives that differences show', () => {
    fc.assert(fc.property(conic, (c) => {
      const start = flat(stateOf(c))
      const [out, above, below, partials] = [new Float64Array(6), new Float64Array(6), new Float64Array(6), new Float64Array(36)]
      moveInto(start, MU, c.days, out, partials)
      for (let j = 0; j < 6; j++) {
        const h = 1e-6 * length(start, j < 3 ? 0 : 3)
        const shifted = (by: number) => start.map((value, k) => (k === j ? value + by : value))
        moveInto(shifted(h), MU, c.days, above)
        moveInto(shifted(-h), MU, c.days, below)
        for (let i = 0; i < 6; i++) {
          const scale = (length(out, i < 3 ? 0 : 3) / length(start, j < 3 ? 0 : 3)) * (1 + Math.abs(c.days) * Math.max(length(start, 3) / length(start, 0), length(out, 3) / length(out, 0)))
          expect(Math.abs((above[i]! - below[i]!) / (2 * h) - partials[6 * i + j]!) / scale).toBeLessThan(3e-7)
        }
      }
    }), { seed: 33, numRuns: 200 })
  })

  it('keeps its partial derivatives over many revolutions', () => {
    const start = Float64Array.of(1, 0, 0, 0, 0.017, 0.002)
    const [out, above, below, partials] = [new Float64Array(6), new Float64Array(6), new Float64Array(6), new Float64Array(36)]
    moveInto(start, MU, 4000, out, partials)
    moveInto(Float64Array.of(1 + 1e-7, 0, 0, 0, 0.017, 0.002), MU, 4000, above)
    moveInto(Float64Array.of(1 - 1e-7, 0, 0, 0, 0.017, 0.002), MU, 4000, below)
    expect(partials[6]! / ((above[1]! - below[1]!) / 2e-7)).toBeCloseTo(1, 6)
  })

  it('refuses a fall into the centre and numbers that are none', () => {
    const out = new Float64Array(6)
    expect(moveInto([1, 0, 0, -0.01, 0, 0], MU, 5, out)).toBe(false)
    expect(moveInto([0, 0, 0, 0.01, 0.01, 0], MU, 5, out)).toBe(false)
    expect(moveInto([1, NaN, 0, 0.01, 0.01, 0], MU, 5, out)).toBe(false)
    expect(moveInto([1, 0, 0, 0, 0.01, 0], MU, NaN, out)).toBe(false)
  })
})
