import { describe, expect, it } from 'vitest'
import * as own from '../../../../fitting/elementary'
import { randomStream } from '../../../../fitting/random'
import { ulpsApart } from './ulps'

const oddities = [NaN, Infinity, -Infinity, 0, -0, 5e-324, -5e-324, 1e-310, 1, -1, 0.5, -0.5, 1.7976931348623157e308, -1.7976931348623157e308, 22, -22, 710, -745.2]

describe('elementary functions at the edges', () => {
  const pairs: [string, (x: number) => number, (x: number) => number][] = [
    ['sin', own.sin, Math.sin], ['cos', own.cos, Math.cos], ['atan', own.atan, Math.atan], ['asin', own.asin, Math.asin], ['acos', own.acos, Math.acos],
    ['exp', own.exp, Math.exp], ['expm1', own.expm1, Math.expm1], ['log', own.log, Math.log], ['log1p', own.log1p, Math.log1p],
    ['sinh', own.sinh, Math.sinh], ['cosh', own.cosh, Math.cosh], ['tanh', own.tanh, Math.tanh], ['atanh', own.atanh, Math.atanh],
    ['asinh', own.asinh, Math.asinh], ['cbrt', own.cbrt, Math.cbrt],
  ]
  it.each(pairs)('%s treats NaN, infinities, zeros and extreme numbers as the standard one', (_, mine, standard) => {
    for (const x of oddities) expect(ulpsApart(mine(x), standard(x)), `at ${x}: ${mine(x)} for ${standard(x)}`).toBeLessThanOrEqual(1)
  })

  it.each(['sin', 'atan', 'asin', 'expm1', 'log1p', 'sinh', 'tanh', 'atanh', 'asinh', 'cbrt'] as const)('%s keeps the sign of zero', (name) => {
    expect(own[name](-0)).toBe(-0)
    expect(own[name](0)).toBe(0)
  })

  it('atan2 treats zeros, infinities and NaN as the standard one', () => {
    for (const y of oddities) {
      for (const x of oddities) {
        const mine = own.atan2(y, x)
        const standard = Math.atan2(y, x)
        expect(Object.is(mine, standard) || (mine !== 0 && ulpsApart(mine, standard) <= 1), `atan2(${y}, ${x}): ${mine} for ${standard}`).toBe(true)
      }
    }
  })

  it('sine and cosine together are the same bits as each alone', () => {
    const random = randomStream(3)
    const out = new Float64Array(2)
    const differing: number[] = []
    for (let n = 0; n < 100_000; n++) {
      const x = (random.uniform() - 0.5) * (n % 2 ? 10 : 1e7)
      own.sinCosInto(x, out)
      if (out[0] !== own.sin(x) || out[1] !== own.cos(x)) differing.push(x)
    }
    expect(differing).toEqual([])
    own.sinCosInto(NaN, out)
    expect([...out]).toEqual([NaN, NaN])
    own.sinCosInto(-Infinity, out)
    expect([...out]).toEqual([NaN, NaN])
  })

  it('hypot neither overflows nor underflows where its result fits', () => {
    expect(ulpsApart(own.hypot(3e200, 4e200), 5e200)).toBeLessThanOrEqual(1)
    expect(ulpsApart(own.hypot(3e-200, 4e-200), 5e-200)).toBeLessThanOrEqual(1)
    expect(own.hypot(-5, 12)).toBe(13)
    expect(own.hypot(0, -2)).toBe(2)
    expect(own.hypot(5e-324, 0)).toBe(5e-324)
    expect(own.hypot(NaN, Infinity)).toBe(Infinity)
    expect(own.hypot(NaN, 1)).toBeNaN()
    expect(own.hypot(1, NaN)).toBeNaN()
  })
})

/** Whether h is within one unit in the last place of √(x² + y²), decided in whole numbers. */
function isLengthWithinOneUlp(h: number, x: number, y: number): boolean {
  const unit = 2 ** (Math.floor(Math.log2(h)) - 52)
  const whole = (v: number) => BigInt(v * 2 ** 120)
  const square = whole(x) ** 2n + whole(y) ** 2n
  return whole(h - unit) ** 2n <= square && square <= whole(h + unit) ** 2n
}

describe('hypot', () => {
  it('is within one unit in the last place of the true length', () => {
    const random = randomStream(11)
    const wrong: [number, number][] = []
    for (let n = 0; n < 40_000; n++) {
      const x = Math.floor((random.uniform() + 2e-9) * 2 ** 50) / 2 ** 50
      const y = Math.floor(random.uniform() * 2 ** 50) / 2 ** (50 + n % 8)
      if (!isLengthWithinOneUlp(own.hypot(x, y), x, y)) wrong.push([x, y])
    }
    expect(wrong).toEqual([])
  })
})
