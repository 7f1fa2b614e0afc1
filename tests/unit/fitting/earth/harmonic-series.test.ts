import { describe, expect, it } from 'vitest'
import { evaluateSeriesInto, gatherSeries, type HarmonicTerms } from '../../../../fitting/earth/harmonic-series'
import { randomStream } from '../../../../fitting/random'

const stream = randomStream(17)
/** Frequencies from a short list, so that components and terms share them. */
const frequencies = [0, 0.5, 6.28, 12.5, 77.1]
const terms: HarmonicTerms = [7, 5, 2].map(count => [0, 1, 2].map(() => (
  Array.from({ length: count }, () => [stream.normal(), 6 * stream.uniform(), frequencies[stream.below(frequencies.length)]!]).flat()
)))

/** The sum as it is defined, term by term. */
function summed(component: number, t: number): number {
  let sum = 0
  for (const [power, components] of terms.entries()) {
    const numbers = components[component]!
    for (let k = 0; k < numbers.length; k += 3) sum += t ** power * numbers[k]! * Math.cos(numbers[k + 1]! + numbers[k + 2]! * t)
  }
  return sum
}

describe('a harmonic series', () => {
  const series = gatherSeries(terms)
  const out = new Float64Array(6)

  it.each([0, 0.3, -1.7, 12.25])('is the sum of its terms at t = %d', (t) => {
    evaluateSeriesInto(series, t, out)
    for (let k = 0; k < 3; k++) expect(Math.abs(out[k]! - summed(k, t))).toBeLessThan(1e-12 * (1 + t * t))
  })

  it.each([0, 0.3, -1.7])('has the slope of that sum at t = %d', (t) => {
    const step = 1e-5
    evaluateSeriesInto(series, t, out)
    for (let k = 0; k < 3; k++) {
      const slope = (summed(k, t + step) - summed(k, t - step)) / (2 * step)
      expect(Math.abs(out[k + 3]! - slope)).toBeLessThan(1e-4)
    }
  })

  it('takes one sine and cosine a frequency, whatever the number of terms', () => {
    for (const gathered of series) expect(gathered.length / 7).toBeLessThanOrEqual(frequencies.length)
  })
})
