import { describe, expect, it } from 'vitest'
import { randomStream } from '../../../fitting/random'

describe('randomStream', () => {
  it('gives the same numbers for the same seed and others for another', () => {
    const draw = (seed: number) => {
      const random = randomStream(seed)
      return Array.from({ length: 20 }, () => [random.uniform(), random.normal(), random.below(1000)]).flat()
    }
    expect(draw(1)).toEqual(draw(1))
    expect(draw(1)).not.toEqual(draw(2))
    expect(draw(0)).not.toEqual(draw(1))
  })

  it('draws uniform numbers in [0, 1) evenly over ten bins', () => {
    const random = randomStream(42)
    const bins = new Array<number>(10).fill(0)
    for (let n = 0; n < 100_000; n++) {
      bins[Math.floor(random.uniform() * 10)]!++
    }
    expect(bins).toHaveLength(10)
    // χ² of nine degrees of freedom: 27.9 is exceeded once in a thousand.
    expect(bins.reduce((sum, count) => sum + (count - 10_000) ** 2 / 10_000, 0)).toBeLessThan(27.9)
  })

  it('draws normal deviates with the moments of the normal distribution', () => {
    const random = randomStream(43)
    const sums = [0, 0, 0, 0, 0]
    const count = 200_000
    for (let n = 0; n < count; n++) {
      const z = random.normal()
      for (let power = 1; power <= 4; power++) sums[power]! += z ** power
    }
    const [, mean, square, cube, fourth] = sums.map(sum => sum / count)
    // Four standard errors of each moment: √(1, 2, 15, 96)/√count.
    expect(Math.abs(mean!)).toBeLessThan(0.009)
    expect(Math.abs(square! - 1)).toBeLessThan(0.013)
    expect(Math.abs(cube!)).toBeLessThan(0.035)
    expect(Math.abs(fourth! - 3)).toBeLessThan(0.09)
  })

  it('draws every whole number below a bound and none beyond', () => {
    const random = randomStream(44)
    const seen = new Set(Array.from({ length: 1000 }, () => random.below(7)))
    expect([...seen].sort()).toEqual([0, 1, 2, 3, 4, 5, 6])
  })
})
