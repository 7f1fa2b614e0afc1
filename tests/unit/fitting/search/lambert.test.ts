import { describe, expect, it } from 'vitest'
import { moveInto } from '../../../../fitting/conic/universal'
import { randomStream } from '../../../../fitting/random'
import { joinInto } from '../../../../fitting/search/lambert'
import { positiveRoots } from '../../../../fitting/search/positive-roots'

const MU = 2.959122082855911e-4
const cross = (a: ArrayLike<number>, b: ArrayLike<number>) => [a[1]! * b[2]! - a[2]! * b[1]!, a[2]! * b[0]! - a[0]! * b[2]!, a[0]! * b[1]! - a[1]! * b[0]!]
const dot = (a: ArrayLike<number>, b: ArrayLike<number>) => a[0]! * b[0]! + a[1]! * b[1]! + a[2]! * b[2]!

describe('the conic through two places', () => {
  it('is the one that the body took, bound or not, the short way or the long', () => {
    const random = randomStream(3)
    const [end, found] = [new Float64Array(6), new Float64Array(6)]
    let [joined, hyperbolas, longWays] = [0, 0, 0]
    for (let i = 0; i < 3000; i++) {
      const state = Float64Array.from({ length: 6 }, (_, k) => (random.uniform() - 0.5) * (k < 3 ? 4 : 0.03))
      const days = 1 + 100 * random.uniform()
      const alpha = 2 / Math.hypot(state[0]!, state[1]!, state[2]!) - dot(state.subarray(3), state.subarray(3)) / MU
      if (!moveInto(state, MU, days, end) || (alpha > 0 && days > (2 * Math.PI) / Math.sqrt(MU * alpha ** 3))) continue
      const isLongWay = dot(cross(state, state.subarray(3)), cross(state, end)) < 0
      const cosine = dot(state, end) / Math.hypot(state[0]!, state[1]!, state[2]!) / Math.hypot(end[0]!, end[1]!, end[2]!)
      if (cosine < -0.9999) continue
      expect(joinInto(state, end, days, { mu: MU, isLongWay }, found)).toBe(true)
      const error = Math.hypot(found[0]! - state[3]!, found[1]! - state[4]!, found[2]! - state[5]!) / Math.hypot(state[3]!, state[4]!, state[5]!)
      expect(error).toBeLessThan(1e-8)
      joined++
      if (alpha < 0) hyperbolas++
      if (isLongWay) longWays++
    }
    expect(Math.min(joined / 10, hyperbolas, longWays)).toBeGreaterThan(50)
  })

  it('does not exist for places that lie opposite, nor for no time', () => {
    const out = new Float64Array(6)
    expect(joinInto([1, 0, 0], [-2, 0, 0], 100, { mu: MU, isLongWay: false }, out)).toBe(false)
    expect(joinInto([1, 0, 0], [0, 1, 0], 0, { mu: MU, isLongWay: false }, out)).toBe(false)
  })
})

describe('Gauss’s equation of the eighth degree', () => {
  it('gives up each of its three roots', () => {
    const [r1, r2, r3] = [0.8, 0.99, 2.1]
    // a, b, c that make all three roots: a linear system in a, b, c.
    const rows = [r1, r2, r3].map((r) => [r ** 6, r ** 3, 1, -(r ** 8)])
    for (let i = 0; i < 3; i++) for (let k = 0; k < 3; k++) if (k !== i) { const f = rows[k]![i]! / rows[i]![i]!; rows[k] = rows[k]!.map((value, j) => value - f * rows[i]![j]!) }
    const [a, b, c] = rows.map((row, i) => row[3]! / row[i]!) as [number, number, number]
    positiveRoots(a, b, c).forEach((root, i) => expect(root).toBeCloseTo([r1, r2, r3][i]!, 10))
    expect(positiveRoots(a, b, c)).toHaveLength(3)
  })

  it('has no root where every coefficient is positive, and none for numbers that are none', () => {
    expect(positiveRoots(1, 1, 1)).toEqual([])
    expect(positiveRoots(NaN, 1, 1)).toEqual([])
  })
})
